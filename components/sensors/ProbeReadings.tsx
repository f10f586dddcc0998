'use client';

import { useRef } from 'react';
import { when } from '@/components/charts/zone';
import { Haze } from '@/components/ui/Haze';
import { GroupBar } from '@/components/ui/Page';
import { temperatureName, temperatureNumber } from '@/components/ui/units';
import { useWidth } from '@/components/ui/width';
import type { SensorBody } from '@/lib/contracts/sensors';
import { useRawReadings } from '@/lib/client/sensors';
import { placed, scaleOf } from './calibration-picture';

const HEIGHT = 220;
const [LEFT, RIGHT] = [56, 12];

/** What a probe said lately: the room's temperature, or the height of the foam. */
export function ProbeReadings({ sensor, now, timeZone }: { sensor: SensorBody; now: number; timeZone: string }) {
  const { data, loading } = useRawReadings(sensor.id, 500);
  const frame = useRef<HTMLDivElement>(null);
  const width = Math.max(288, useWidth(frame, 720));
  const foam = sensor.kind === 'foam';
  const unit = foam ? 'mm' : temperatureName();
  const read = (kept: number) => (foam ? kept : Number(temperatureNumber(kept, 2).replace('−', '-')));
  const said = (data?.items ?? [])
    .flatMap((reading) => {
      const value = foam ? reading.foam : reading.temperature;
      return value === null ? [] : [{ at: Date.parse(reading.measured_at) / 1000, value: read(value) }];
    })
    .reverse();
  const [first, last] = [said[0], said.at(-1)];
  const scale = scaleOf(foam ? [0, ...said.map((point) => point.value)] : said.map((point) => point.value), 5);
  // No foam stands below the drink.
  const y = foam ? { ...scale, from: 0, ticks: scale.ticks.filter((tick) => tick >= 0) } : scale;
  const up = placed(y, HEIGHT - 24, 10);
  const x = (at: number) => LEFT + (width - LEFT - RIGHT) * (first && last && last.at > first.at ? (at - first.at) / (last.at - first.at) : 1);
  return (
    <section aria-label={foam ? 'Foam' : 'Temperature'}>
      <GroupBar word={foam ? 'Foam above the drink' : 'Temperature of the room'} note={last ? `${last.value.toFixed(foam ? 0 : 1)} ${unit} at ${when(last.at, now, timeZone)}` : undefined} />
      <div className="border-b px-(--margin) py-3">
        <div ref={frame} className="min-w-0">
          {loading && <Haze height={HEIGHT} label="Loading what it said" />}
          {!loading && said.length === 0 && <p className="type-body text-ink2">Nothing heard yet.</p>}
          {first && last && (
            <svg width={width} height={HEIGHT} role="img" aria-label={`From ${first.value.toFixed(1)} to ${last.value.toFixed(1)} ${unit} in ${said.length} readings`} className="block font-mono" fontSize="12" fontWeight="500">
              {y.ticks.map((tick) => (
                <g key={tick}>
                  <path d={`M${LEFT} ${up(tick)}H${width - RIGHT}`} stroke="var(--rule)" />
                  <text x={LEFT - 8} y={up(tick) + 4} textAnchor="end" fill="var(--ink2)">
                    {Number(tick.toFixed(2))} {unit}
                  </text>
                </g>
              ))}
              <path d={said.map((point, index) => `${index === 0 ? 'M' : 'L'}${x(point.at).toFixed(1)} ${up(point.value).toFixed(1)}`).join('')} fill="none" stroke={foam ? 'var(--ink)' : 'var(--mercury)'} strokeWidth="1.8" />
              <text x={LEFT} y={HEIGHT - 6} fill="var(--ink2)">
                {when(first.at, now, timeZone)}
              </text>
              <text x={width - RIGHT} y={HEIGHT - 6} textAnchor="end" fill="var(--ink2)">
                {when(last.at, now, timeZone)}
              </text>
            </svg>
          )}
        </div>
      </div>
    </section>
  );
}
