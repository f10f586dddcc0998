'use client';

import { useEffect, useState } from 'react';
import { LinkButton } from '@/components/ui/Button';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import type { CreatedSensorBody } from '@/lib/contracts/sensors';
import { ConnectLines, CopyLine, type Doors } from './ConnectLines';
import { FirstMessage } from './FirstMessage';

/** What a sensor with a camera, or the phone that sets it up, reads from the picture. */
export const pairingText = (sensor: Pick<CreatedSensorBody, 'id' | 'secret' | 'topic'>, doors: Doors) =>
  JSON.stringify({ sensor: sensor.id, secret: sensor.secret, mqtt: `${doors.mqttHost}:${doors.mqttPort}`, topic: sensor.topic, http: `${doors.httpUrl}/api/v1/telemetry` });

/** Drawn in the browser: the secret goes to no other server. */
function PairingCode({ text }: { text: string }) {
  const [svg, setSvg] = useState<string | null>(null);
  useEffect(() => {
    let gone = false;
    void import('qrcode').then((qrcode) => qrcode.toString(text, { type: 'svg', errorCorrectionLevel: 'M', margin: 2, color: { dark: '#14201a', light: '#f9fbf6' } })).then((drawn) => !gone && setSvg(drawn));
    return () => {
      gone = true;
    };
  }, [text]);
  return (
    <figure className="flex w-[196px] flex-col gap-1.5">
      <div role="img" aria-label="Code with the sensor’s identifier, its secret and where to send" className="h-[196px] w-[196px] border-[1.5px] border-ink bg-[#f9fbf6]">
        {/* Drawn here, from here: nothing to fetch or to optimise. */}
        {/* eslint-disable-next-line @next/next/no-img-element -- made on the spot: nothing to load or to shrink */}
        {svg && <img alt="" src={`data:image/svg+xml;utf8,${encodeURIComponent(svg)}`} className="h-full w-full" />}
      </div>
      <figcaption className="type-label text-ink2">identifier, secret, broker and address, as JSON</figcaption>
    </figure>
  );
}

/** The secret, this one time: as a picture, as lines to paste, and the place where its first message shows. */
export function SecretShown({ sensor, doors, since, onDone }: { sensor: CreatedSensorBody; doors: Doors; since: number; onDone?: () => void }) {
  return (
    <>
      <PageHead title={sensor.name} meta={`sensor ${sensor.id}`}>
        <LinkButton href={`/sensors/${sensor.id}`} look="first" onClick={onDone}>
          It is in the sensor
        </LinkButton>
      </PageHead>
      <div className="wide:grid wide:min-h-[calc(100dvh-101px)] wide:grid-cols-[minmax(0,1fr)_424px]">
        <div className="flex min-w-0 flex-col gap-5 px-(--margin) py-5">
          <div className="border-l-[3px] border-ink bg-lit py-3 pl-4 pr-3">
            <h2 className="type-verdict-now">The secret is shown this one time</h2>
            <p className="type-body text-ink2">Write it into the sensor now. Only its fingerprint is kept here: a lost secret is replaced by a new one on the sensor’s page.</p>
          </div>
          <div className="flex flex-wrap items-start gap-x-6 gap-y-5">
            <PairingCode text={pairingText(sensor, doors)} />
            <div className="flex min-w-[min(100%,320px)] flex-1 flex-col gap-4">
              <CopyLine label="identifier, also the MQTT user name" text={sensor.id} />
              <CopyLine label="secret, also the MQTT password" text={sensor.secret} />
            </div>
          </div>
          <ConnectLines sensor={sensor.id} secret={sensor.secret} doors={doors} kind={sensor.kind} />
        </div>
        <div className="wide:border-l">
          <GroupBar word="First message" />
          <FirstMessage sensorId={sensor.id} since={since} />
          <p className="type-reason px-(--margin) py-3 text-ink2">
            <Sentence>Run one of the lines, or let the sensor speak: what it sends stands here within 2 s, and so does what was refused.</Sentence>
          </p>
        </div>
      </div>
    </>
  );
}
