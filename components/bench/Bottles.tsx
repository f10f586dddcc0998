'use client';

import { Field, Select } from '@/components/ui/Field';
import { MOST_BOTTLE_ROWS } from '@/lib/contracts/bench';
import { BOTTLE_KINDS, BOTTLES, CLOSURE_CATALOGUE, type BottleKind, type Closure } from '@/lib/core/bottling/bottles';
import { BottleDrawing } from './BottleDrawing';
import { newRow, type BenchDraft, type BenchErrors, type BottleRow } from './draft';
import { SHORT_BOTTLE, sizeWords } from './words';

const usual = (kind: BottleKind) => (BOTTLES[kind].rating === 'never' ? 'never' : BOTTLES[kind].rating.toFixed(1));

interface RowProps {
  row: BottleRow;
  index: number;
  drops: boolean;
  errors: BenchErrors;
  onChange: (row: BottleRow) => void;
  onRemove: (() => void) | null;
}

function Row({ row, index, drops, errors, onChange, onRemove }: RowProps) {
  const entry = BOTTLES[row.kind];
  const set = (part: Partial<BottleRow>) => onChange({ ...row, ...part });
  const error = (name: string) => errors[`bottles.${index}.${name}`];
  const never = entry.rating === 'never' || CLOSURE_CATALOGUE[row.closure].rating === 'never';
  return (
    <fieldset className="min-w-0 border-t py-3">
      <legend className="float-left w-full pb-1">
        <span className="flex items-baseline justify-between gap-3">
          <span className="type-name-low">{entry.name}</span>
          {onRemove && (
            <button type="button" onClick={onRemove} aria-label={`Take the ${entry.name} off the bench`} className="type-label min-h-8 text-ink2 underline underline-offset-4 max-strip:min-h-11">
              Take off
            </button>
          )}
        </span>
      </legend>
      <div className="clear-both grid grid-cols-2 gap-3">
        <Field label="size" unit="ml" inputMode="numeric" list={`sizes-${row.key}`} value={row.size} error={error('size_ml')} onChange={(event) => set({ size: event.target.value })} />
        <datalist id={`sizes-${row.key}`}>
          {entry.usualSizesMl.map((ml) => (
            <option key={ml} value={ml}>
              {sizeWords(ml)}
            </option>
          ))}
        </datalist>
        <Field label="at hand" placeholder="enough" inputMode="numeric" value={row.atHand} error={error('at_hand')} onChange={(event) => set({ atHand: event.target.value })} />
        <Select label="closed by" className="max-strip:col-span-2" value={row.closure} error={error('closure')} onChange={(event) => set({ closure: event.target.value as Closure })}>
          {entry.closures.map((closure) => (
            <option key={closure} value={closure}>
              {CLOSURE_CATALOGUE[closure].name}
            </option>
          ))}
        </Select>
        {never ? (
          <Field label="holds" held value="never under pressure" readOnly />
        ) : (
          <Field label="maker’s figure" unit="bar" placeholder="not read" inputMode="decimal" value={row.confirmed} error={error('confirmed_bar')} onChange={(event) => set({ confirmed: event.target.value })} />
        )}
        {drops && <Field label="drops in each" inputMode="numeric" value={row.drops} error={error('drops')} onChange={(event) => set({ drops: event.target.value })} />}
      </div>
      <p className="type-reason pt-2 text-ink2">
        {entry.note} {CLOSURE_CATALOGUE[row.closure].note}
      </p>
    </fieldset>
  );
}

/** The catalogue of bottles to put on the bench, and a row for each that stands there. Filled in order: the small one last. */
export function Bottles({ draft, errors, onChange }: { draft: BenchDraft; errors: BenchErrors; onChange: (bottles: BottleRow[]) => void }) {
  const rows = draft.bottles;
  const add = (kind: BottleKind) => {
    const sizes = BOTTLES[kind].usualSizesMl;
    const size = sizes.toReversed().find((ml) => ml <= 1000 && !rows.some((row) => row.kind === kind && row.size === String(ml))) ?? sizes[0]!;
    onChange([...rows, newRow(kind, size, rows.map((row) => row.key))]);
  };
  return (
    <section aria-label="Bottles">
      <p className="type-label flex justify-between gap-3 pb-1 text-ink2">
        <span>bottles</span>
        <span>usual rating, bar</span>
      </p>
      <div role="group" aria-label="Put a bottle on the bench" className="grid grid-cols-4 gap-px border-[1.5px] border-ink2 bg-rule2">
        {BOTTLE_KINDS.map((kind) => {
          const count = rows.filter((row) => row.kind === kind).length;
          return (
            <button
              key={kind}
              type="button"
              aria-label={`Add a ${BOTTLES[kind].name}, usually rated ${usual(kind)}${count > 0 ? `; ${count} on the bench` : ''}`}
              onClick={() => add(kind)}
              disabled={rows.length >= MOST_BOTTLE_ROWS}
              className={`type-tick relative flex min-w-0 flex-col items-center gap-1 px-0.5 pb-1 pt-2 ${count > 0 ? 'bg-desk outline-2 -outline-offset-2 outline-ink' : 'bg-lit hover:bg-desk'}`}
            >
              <BottleDrawing kind={kind} filled={count > 0} height={54} />
              <span className="w-full break-words text-center">{SHORT_BOTTLE[kind]}</span>
              <span className="font-semibold">{usual(kind)}</span>
              {count > 0 && (
                <svg viewBox="0 0 10 10" width="14" height="14" aria-hidden className="absolute right-0 top-0 text-ink">
                  <path d="M0 0h10v10Z" fill="currentColor" />
                </svg>
              )}
            </button>
          );
        })}
      </div>
      {errors.bottles && <p className="type-label pt-1 text-madder">{errors.bottles}</p>}
      <p className="type-reason pb-2 pt-1 text-ink2">Filled in this order: put the small size last, for the rest.{rows.length >= MOST_BOTTLE_ROWS && ` The bench is full: ${MOST_BOTTLE_ROWS} kinds and sizes in one plan. Take one off to add another, or bottle the rest as a second lot.`}</p>
      {rows.map((row, index) => (
        <Row
          key={row.key}
          row={row}
          index={index}
          drops={draft.way === 'drops'}
          errors={errors}
          onChange={(changed) => onChange(rows.map((other) => (other.key === row.key ? changed : other)))}
          onRemove={rows.length > 1 ? () => onChange(rows.filter((other) => other.key !== row.key)) : null}
        />
      ))}
    </section>
  );
}
