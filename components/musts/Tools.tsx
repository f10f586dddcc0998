'use client';

import { useState, type FormEvent } from 'react';
import { litres, typedGravity, typedNumber } from '@/components/batch/figures';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field, Select } from '@/components/ui/Field';
import { UnitField } from '@/components/units/UnitField';
import { amountFor, scaleToFill } from '@/lib/core/must/solve';
import { amountText } from './amount';
import { bodyOf, coreSheet, type SheetDraft } from './draft';
import { unitWord } from './words';

type Apply = (draft: SheetDraft, said: string) => void;

/** The draft with the amounts of a changed sheet. */
function withAmounts(draft: SheetDraft, lines: readonly { id: string; amount: { quantity: { lo: number; value: number; hi: number } } }[]): SheetDraft {
  const amounts = new Map(lines.map((line) => [line.id, amountText(line.amount.quantity)]));
  return { ...draft, lines: draft.lines.map((line) => ({ ...line, amount: amounts.get(line.id) ?? line.amount })) };
}

/** The same must for another vessel. */
function Scale({ draft, onApply }: { draft: SheetDraft; onApply: Apply }) {
  const [fill, setFill] = useState('');
  const [vessel, setVessel] = useState('');
  const [error, setError] = useState<string | undefined>();

  function scale(event: FormEvent) {
    event.preventDefault();
    const wanted = typedNumber(fill);
    const holds = typedNumber(vessel);
    if (wanted === null || !(wanted >= 0.05 && wanted <= 2000)) return setError('must be between 0.05 and 2000 L');
    if (holds !== null && !(holds >= wanted)) return setError('is more than the vessel holds');
    const scaled = scaleToFill(coreSheet(bodyOf(draft).body), wanted);
    if (!scaled) return setError('The sheet cannot be reckoned yet.');
    setError(undefined);
    onApply({ ...withAmounts(draft, scaled.lines), boiled: scaled.boiledAwayL > 0 ? String(Number(scaled.boiledAwayL.toPrecision(4))) : draft.boiled, vessel: vessel.trim() === '' ? draft.vessel : vessel }, `Scaled to ${litres(wanted)}.`);
  }

  return (
    <form onSubmit={scale} noValidate className="flex flex-wrap items-end gap-2">
      <UnitField measure="volume" label="Must fills, with pulp" className="flex-1 basis-32" value={fill} onChange={(event) => setFill(event.target.value)} error={error} />
      <UnitField measure="volume" label="That vessel holds" className="flex-1 basis-32" value={vessel} placeholder={draft.vessel || 'as it is'} onChange={(event) => setVessel(event.target.value)} />
      <Button type="submit">Scale</Button>
    </form>
  );
}

/** From what is wanted back to the amount of one line. */
function Solve({ draft, onApply }: { draft: SheetDraft; onApply: Apply }) {
  const [line, setLine] = useState('');
  const [by, setBy] = useState<'original' | 'abv'>('original');
  const [wanted, setWanted] = useState('');
  const [error, setError] = useState<string | undefined>();

  function solve(event: FormEvent) {
    event.preventDefault();
    const value = by === 'original' ? typedGravity(wanted) : typedNumber(wanted);
    if (value === null || Number.isNaN(value)) return setError(by === 'original' ? 'a gravity, such as 1.062' : 'a strength, such as 8.5');
    const chosen = draft.lines.find((item) => item.id === line);
    if (!chosen) return setError('choose the line that may change');
    const solved = amountFor(coreSheet(bodyOf(draft).body), line, by === 'original' ? { original: value } : { abvPercent: value });
    if (!solved.ok) return setError(solved.sentence);
    setError(undefined);
    const next = withAmounts(draft, solved.sheet.lines);
    onApply(next, `${chosen.ingredient.name}: ${next.lines.find((item) => item.id === line)?.amount ?? ''} ${unitWord(chosen.unit, chosen.ingredient)}, was ${chosen.amount}.`);
  }

  return (
    <form onSubmit={solve} noValidate className="flex flex-col gap-3">
      <Choice label="Wanted" bare value={by} onChoose={setBy} options={[{ value: 'original', name: 'Original gravity' }, { value: 'abv', name: 'Strength, Balling' }]} />
      <div className="flex flex-wrap items-end gap-2">
        {by === 'original' ? (
          <UnitField measure="gravity" label="Wanted" className="flex-1 basis-28" value={wanted} onChange={(event) => setWanted(event.target.value)} error={error} />
        ) : (
          <Field label="Wanted" className="flex-1 basis-28" unit="% vol" inputMode="decimal" autoComplete="off" value={wanted} onChange={(event) => setWanted(event.target.value)} error={error} />
        )}
        <Select label="By changing" className="min-w-0 flex-1 basis-40" value={line} onChange={(event) => setLine(event.target.value)}>
          <option value="">Choose a line</option>
          {draft.lines.map((item) => (
            <option key={item.id} value={item.id}>
              {item.ingredient.name}
            </option>
          ))}
        </Select>
        <Button type="submit">Work it out</Button>
      </div>
    </form>
  );
}

/** Two ways to change the amounts that need a calculator otherwise; each can be taken back. */
export function Tools({ draft, onChange }: { draft: SheetDraft; onChange: (draft: SheetDraft) => void }) {
  const [done, setDone] = useState<{ said: string; before: SheetDraft } | null>(null);
  const apply: Apply = (next, said) => {
    setDone({ said, before: draft });
    onChange(next);
  };
  if (draft.lines.length === 0) return null;
  return (
    <section aria-labelledby="tools" className="mt-6 border-t-[1.5px] border-ink pt-3">
      <h2 id="tools" className="type-sub">
        Change the amounts
      </h2>
      <div className="mt-2 flex flex-col gap-2">
        <h3 className="type-verdict">For another vessel</h3>
        <Scale draft={draft} onApply={apply} />
        <h3 className="type-verdict mt-3">Back from what is wanted</h3>
        <Solve draft={draft} onApply={apply} />
        <div role="status" className="min-h-8">
          {done && (
            <p className="type-body flex flex-wrap items-center gap-3">
              {done.said}
              <Button
                size="lane"
                look="quiet"
                onClick={() => {
                  onChange(done.before);
                  setDone(null);
                }}
              >
                Take it back
              </Button>
            </p>
          )}
        </div>
      </div>
    </section>
  );
}
