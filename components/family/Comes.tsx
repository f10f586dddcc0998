import { gravityText, litres, percent, points } from '@/components/batch/figures';
import { How } from '@/components/ui/How';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { Vessel } from '@/components/vessel/Vessel';
import type { BatchBody } from '@/lib/contracts/batches';
import type { Racking } from '@/lib/core/family/cellarwork';
import type { Neck } from '@/lib/core/types';
import type { Poured } from './poured';

const ROOM = {
  too_much: { state: 'Stop', word: 'Too much' },
  air: { state: 'Check', word: 'Much air above it' },
  fits: { state: 'Ready', word: 'It fits' },
} as const;

function roomWords({ litres: full, vesselL, room }: Poured): string {
  if (room === 'too_much') return `${litres(full)} do not go into ${litres(vesselL)}.`;
  const free = `${litres(full)} in ${litres(vesselL)}: ${litres(vesselL - full)} free.`;
  return room === 'air' ? `${free} A drink that no longer works browns under air: top it up, or take a smaller vessel.` : free;
}

/** Less than this is not worth telling: a hydrometer shows no tenth of a point. */
const SHOWN = 0.05;

function changeWords({ gravityChangePoints: gravity, abvChangePercent: strength, reading }: Racking): string {
  const [moves, thins] = [Math.abs(gravity) >= SHOWN, Math.abs(strength) >= SHOWN];
  if (!moves && !thins) return 'Gravity and strength stay as they are.';
  const signed = `${strength >= 0 ? '+' : '−'}${Math.abs(strength).toFixed(1)} %`;
  const first = moves ? `Gravity ${gravity > 0 ? '+' : ''}${points(gravity)}` : 'Gravity as it was';
  return `${first}, strength ${thins ? signed : 'as it was'}${reading ? `; as if it had begun at ${gravityText(reading.effectiveOg)}` : ''}.`;
}

/** What a racking or topping up comes to, told before anything is poured. */
export function Comes({ batch, neck, result, waits }: { batch: BatchBody; neck: Neck; result: Poured | null; /** What is still to be told. */ waits: string }) {
  if (!result) {
    return (
      <section aria-label="What it comes to" className="border-l-[3px] border-rule2 pl-3">
        <State state="Leave be" word="Not reckoned yet" />
        <p className="type-verdict mt-1">{waits}</p>
      </section>
    );
  }
  const { moved } = result;
  const after = moved?.reading ?? null;
  const { state, word } = ROOM[result.room];
  return (
    <section aria-label="What it comes to" aria-live="polite" className="flex flex-col gap-3">
      <div className="flex items-end gap-4">
        <Vessel
          silentPicture
          height={118}
          vessel={{ kind: batch.vessel_kind, neck, level: Math.min(1, result.litres / result.vesselL), drink: batch.drink_colour, clearness: 'clearing', krausen: false, lees: 'none', tag: batch.tag, silent: false }}
        />
        <div className="min-w-0 pb-1">
          <State state={state} word={word} />
          <p className="type-verdict mt-1">
            <Sentence>{roomWords(result)}</Sentence>
          </p>
        </div>
      </div>
      {after && moved ? (
        <div>
          <p className="type-verdict-now">
            <Sentence strong>{`${gravityText(after.gravity)}, ${percent(after.abvPercent)}`}</Sentence>
          </p>
          <p className="type-body">
            <Sentence>{changeWords(moved)}</Sentence>
          </p>
          {moved.cautions.length > 0 && (
            <ul className="mt-1 border-l-[3px] border-ochre pl-3">
              {moved.cautions.map((caution) => (
                <li key={caution} className="type-reason">
                  <Sentence>{caution}</Sentence>
                </li>
              ))}
            </ul>
          )}
          <How how={moved.how} of="what it comes to" />
        </div>
      ) : (
        <p className="type-reason text-ink2">{waits}</p>
      )}
    </section>
  );
}
