'use client';

import { Field, Select } from '@/components/ui/Field';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import type { ImportPreviewBody } from '@/lib/contracts/imports';

export type Chosen = Pick<ImportPreviewBody, 'columns' | 'gravity_unit' | 'temperature_unit' | 'time_zone' | 'date_order'>;

const FIELD_WORDS: Record<string, string> = { at: 'time', original_gravity: 'original gravity', final_gravity: 'final gravity', volume: 'litres' };

/** What a file would bring: columns and units to set right, the first rows as they would be kept, and every line that would not. */
export function Preview({ preview, onChoose }: { preview: ImportPreviewBody; onChoose: (chosen: Chosen) => void }) {
  const { columns, gravity_unit, temperature_unit, time_zone, date_order } = preview;
  const choose = (more: Partial<Chosen>) => onChoose({ columns, gravity_unit, temperature_unit, time_zone, date_order, ...more });
  const day = (at: string | null) => at?.slice(0, 10) ?? '';
  return (
    <div>
      <div className="border-b bg-lit px-(--margin) py-3">
        <State state={preview.good === 0 ? 'Stop' : preview.bad > 0 ? 'Check' : 'Ready'} word={preview.good === 0 ? 'Nothing to keep' : preview.bad > 0 ? 'Some lines left out' : 'All understood'} />
        <p className="type-verdict-now">
          <Sentence strong>{`${preview.good} ${preview.kind === 'archive' ? (preview.good === 1 ? 'batch' : 'batches') : preview.good === 1 ? 'line' : 'lines'} understood${preview.bad > 0 ? `, ${preview.bad} not` : ''}.`}</Sentence>
        </p>
        {preview.from && (
          <p className="type-reason text-ink2">
            From <span className="fig">{day(preview.from)}</span> to <span className="fig">{day(preview.to)}</span>.
          </p>
        )}
        {/* What is to be said of readings is about their batch, and stands beside it. */}
        {preview.kind !== 'readings' &&
          preview.notes.map((note) => (
            <p key={note} className="type-reason text-ink2">
              {note}
            </p>
          ))}
      </div>
      {preview.header.length > 0 && (
        <div className="flex flex-wrap items-start gap-3 border-b px-(--margin) py-4">
          {Object.entries(columns).map(([field, column]) => (
            <Select key={field} label={FIELD_WORDS[field] ?? field} value={column ?? ''} onChange={(event) => choose({ columns: { ...columns, [field]: event.target.value === '' ? null : Number(event.target.value) } })} className="w-44">
              <option value="">not in the file</option>
              {preview.header.map((name, index) => (
                <option key={index} value={index}>
                  {name || `column ${index + 1}`}
                </option>
              ))}
            </Select>
          ))}
          {gravity_unit && (
            <Select label="gravity is in" value={gravity_unit} onChange={(event) => choose({ gravity_unit: event.target.value as Chosen['gravity_unit'] })} className="w-44">
              <option value="sg">SG, 1.048</option>
              <option value="points">points, 48 or 1048</option>
              <option value="plato">°Plato, 12</option>
            </Select>
          )}
          {temperature_unit && (
            <Select label="temperature is in" value={temperature_unit} onChange={(event) => choose({ temperature_unit: event.target.value as Chosen['temperature_unit'] })} className="w-36">
              <option value="c">°C</option>
              <option value="f">°F</option>
            </Select>
          )}
          <Select label="03/04 is" value={date_order} onChange={(event) => choose({ date_order: event.target.value as Chosen['date_order'] })} className="w-36">
            <option value="day">3 April</option>
            <option value="month">4 March</option>
          </Select>
          <Field label="times are on the clock of" defaultValue={time_zone} key={time_zone} onBlur={(event) => event.target.value.trim() !== time_zone && choose({ time_zone: event.target.value.trim() })} className="w-56" hint="where the file names no zone" />
        </div>
      )}
      <div className="grid border-b wide:grid-cols-2">
        <ol className="min-w-0" aria-label="As it would be kept">
          {preview.read.map((row) => (
            <li key={row.line} className="grid grid-cols-[4.5rem_minmax(0,1fr)] border-b border-rule px-(--margin) py-1.5">
              <span className="type-label text-ink2">{preview.kind === 'archive' ? 'batch' : 'line'} {row.line}</span>
              <span className="break-words font-mono text-[0.8125rem]">{row.says}</span>
            </li>
          ))}
        </ol>
        {preview.errors.length > 0 && (
          <ol className="max-h-80 min-w-0 overflow-y-auto wide:border-l" aria-label="Left out" tabIndex={0}>
            {preview.errors.map((error) => (
              <li key={error.line} className="grid grid-cols-[4.5rem_minmax(0,1fr)] border-b border-rule px-(--margin) py-1.5">
                <span className="type-label text-ochre">line {error.line}</span>
                <span className="type-body break-words">{error.says}</span>
              </li>
            ))}
          </ol>
        )}
      </div>
    </div>
  );
}
