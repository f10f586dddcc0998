import { Button } from '@/components/ui/Button';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { Vessel } from '@/components/vessel/Vessel';
import type { VesselState } from '@/components/vessel/describe';
import { TakeIt } from './Calls';
import type { CallRow } from './calls';

/** The person's own word for having done what a call asks, and what is then logged. */
export interface DoneAct {
  word: string;
  onDone: () => void;
}

interface DecisionProps {
  row: CallRow;
  vessel: VesselState;
  /** Time of the state, as `Thu 14:00` or `since Tue 07:30`. */
  when: string | null;
  done: DoneAct | null;
  onRead: (() => void) | null;
  mayTake: boolean;
}

/** On a phone the decision stands above its evidence. */
export function Decision({ row, vessel, when, done, onRead, mayTake }: DecisionProps) {
  return (
    <section aria-label="What to do" className="border-b bg-lit px-(--margin) pb-3 pt-3 strip:hidden">
      <div className="flex gap-3">
        <div className="w-[96px] shrink-0 pt-2">
          <Vessel vessel={vessel} height={112} />
        </div>
        <div className="min-w-0 flex-1">
          <p className="flex flex-wrap items-center gap-x-2">
            <State state={row.state} word={row.word} />
            {when && <span className="type-label text-ink2">{when}</span>}
          </p>
          <h2 className="type-verdict-top mt-1">
            <Sentence strong>{row.headline}</Sentence>
          </h2>
          <p className="type-reason mt-1 text-[0.84375rem] text-ink2">
            <Sentence>{row.reason}</Sentence>
          </p>
        </div>
      </div>
      {(done || onRead || (row.alert && mayTake)) && (
        <div className="mt-3 flex flex-wrap justify-end gap-2 [&>*]:flex-1">
          {row.alert && mayTake && <TakeIt alert={row.alert} />}
          {onRead && !(done && row.alert) && (
            <Button look={done || row.alert ? 'plain' : 'first'} onClick={onRead}>
              Read by hand
            </Button>
          )}
          {done && (
            <Button look="first" onClick={done.onDone}>
              {done.word}
            </Button>
          )}
        </div>
      )}
    </section>
  );
}
