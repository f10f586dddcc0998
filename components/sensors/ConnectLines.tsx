'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import type { SensorKindName } from '@/lib/contracts/sensors';
import { readingsTopic } from '@/lib/contracts/topics';

/** Where sensors reach this house. */
export interface Doors {
  mqttHost: string;
  mqttPort: number;
  httpUrl: string;
}

/** A line to take away; selecting it by hand works too. */
export function CopyLine({ label, text }: { label: string; text: string }) {
  const [copied, setCopied] = useState<'no' | 'yes' | 'failed'>('no');
  const copy = () =>
    navigator.clipboard
      .writeText(text)
      .then(() => setCopied('yes'))
      .catch(() => setCopied('failed'));
  return (
    <div className="flex flex-col gap-1">
      <div className="flex items-end justify-between gap-3">
        <span className="type-label text-ink2">{label}</span>
        <span className="flex items-center gap-3">
          <span role="status" className="type-label text-ink2">
            {copied === 'yes' && 'copied'}
            {copied === 'failed' && 'not copied: select it by hand'}
          </span>
          <Button size="lane" onClick={() => void copy()} aria-label={`Copy: ${label}`}>
            Copy
          </Button>
        </span>
      </div>
      <pre tabIndex={0} className="overflow-x-auto whitespace-pre-wrap break-all rounded border-[1.5px] border-ink2 bg-lit px-3 py-2 font-mono text-[0.75rem]/[1.125rem] font-medium">
        {text}
      </pre>
    </div>
  );
}

const EXAMPLE = { float: '{"gravity":1.048,"temperature":19.2}', room: '{"temperature":14.5}', foam: '{"foam":32,"temperature":19.2}' } as const;

/** Lines that send one reading, ready to run. Without the secret its place is named. */
export function ConnectLines({ sensor, secret, doors, kind = 'float' }: { sensor: string; secret: string | null; doors: Doors; kind?: SensorKindName }) {
  const key = secret ?? 'SECRET';
  return (
    <div className="flex flex-col gap-4">
      <CopyLine label="over MQTT, one reading" text={`mosquitto_pub -h ${doors.mqttHost} -p ${doors.mqttPort} -q 1 -i ${sensor} -u ${sensor} -P '${key}' -t ${readingsTopic(sensor)} -m '${EXAMPLE[kind]}'`} />
      <CopyLine label="over HTTP, one reading" text={`curl -X POST ${doors.httpUrl}/api/v1/telemetry -H 'Authorization: Bearer ${sensor}:${key}' -H 'Content-Type: application/json' -d '${EXAMPLE[kind]}'`} />
    </div>
  );
}
