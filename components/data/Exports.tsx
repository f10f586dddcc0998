'use client';

import { useState } from 'react';
import { buttonClass } from '@/components/ui/Button';
import { Select } from '@/components/ui/Field';
import { GroupBar } from '@/components/ui/Page';
import { useBatches } from '@/lib/client/batches';

const TABLES = [
  { file: 'export.json', name: 'Archive (JSON)', says: 'All of it: musts, batches, logs, sensors and their readings, alerts, lots, tastings, photos, jobs, rules. This house reads it back as it was.' },
  { file: 'export/readings.csv', name: 'Readings (CSV)', says: 'What the floats measured, a line a reading.' },
  { file: 'export/log.csv', name: 'Log (CSV)', says: 'What was done and read by hand.' },
  { file: 'export/batches.csv', name: 'Batches (CSV)', says: 'Their names, dates, gravities and volumes.' },
] as const;

/** Files to save: of one batch, or of all. */
export function Exports() {
  const { batches } = useBatches({});
  const [batch, setBatch] = useState('');
  return (
    <section aria-label="Take out">
      <GroupBar word="Take out" note="gravity SG at 20 °C, temperature °C, times in UTC" />
      <div className="border-b px-(--margin) py-4">
        <Select label="of" value={batch} onChange={(event) => setBatch(event.target.value)} className="max-w-[340px]">
          <option value="">the whole cellar</option>
          {(batches ?? []).map((item) => (
            <option key={item.id} value={item.id}>
              {item.name}
            </option>
          ))}
        </Select>
      </div>
      <ul>
        {TABLES.map((table) => (
          <li key={table.file} className="grid items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,1fr)_auto]">
            <span className="type-body">
              <b className="font-semibold">{table.name}</b> <span className="text-ink2">{table.says}</span>
            </span>
            <a href={`/api/v1/${table.file}${batch === '' ? '' : `?batch=${batch}`}`} download className={buttonClass('plain', 'lane')}>
              Save
            </a>
          </li>
        ))}
      </ul>
      <p className="type-reason border-b px-(--margin) py-2 text-ink2">
        The form of the archive is written down as{' '}
        <a href="/api/v1/archive.schema.json" className="underline underline-offset-2">
          JSON Schema
        </a>
        . Addresses and secrets of sensors, tokens, webhooks, links and invitations stay here, and so does the trail, which has an export of its own; what was taken back stays away. Cells of a CSV that a spreadsheet would run begin with a quote; bringing them in takes it off again.
      </p>
    </section>
  );
}
