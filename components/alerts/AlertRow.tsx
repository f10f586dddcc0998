import { Button } from '@/components/ui/Button';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { Vessel } from '@/components/vessel/Vessel';
import type { AlertBody } from '@/lib/contracts/alerts';
import { alertFate, alertMeta, alertState, alertVessel } from './rows';

interface AlertRowProps {
  alert: AlertBody;
  now: number;
  timeZone: string;
  chosen: boolean;
  mayTake: boolean;
  mayClear: boolean;
  onChoose: () => void;
  onTake: () => void;
  onClear: () => void;
}

/** State, vessel, sentence, who was told, and one button. The whole row opens the detail. */
export function AlertRow({ alert, now, timeZone, chosen, mayTake, mayClear, onChoose, onTake, onClear }: AlertRowProps) {
  const { state, word } = alertState(alert);
  const cleared = alert.state === 'resolved';
  return (
    <li
      className={`relative grid grid-cols-[44px_1fr] items-center gap-x-3 gap-y-1 border-b px-(--margin) py-3 strip:grid-cols-[104px_56px_minmax(0,1fr)_190px_92px] strip:gap-x-4 ${cleared ? 'strip:min-h-[55px] strip:py-1.5' : 'strip:min-h-[78px]'} ${chosen ? 'bg-lit before:absolute before:inset-y-0 before:left-0 before:w-2 before:bg-ink' : 'hover:bg-lit'}`}
    >
      <State state={state} word={word} className="max-strip:col-span-2" />
      <span className="flex justify-center">
        <Vessel vessel={alertVessel(alert)} height={cleared ? 42 : 58} silentPicture />
      </span>
      <div className="min-w-0">
        <h3 className={cleared ? 'type-verdict-leave' : 'type-verdict-now'}>
          {/* The row's first control; its area is the whole row. */}
          <button type="button" aria-current={chosen ? 'true' : undefined} onClick={onChoose} className="text-left after:absolute after:inset-0">
            <Sentence strong>{alert.evidence.headline}</Sentence>
          </button>
        </h3>
        <p className={`type-label text-ink2 ${alert.gone ? '' : 'strip:truncate'}`} title={alertMeta(alert, now, timeZone)}>
          {alertMeta(alert, now, timeZone)}
        </p>
      </div>
      <div className="type-label min-w-0 text-ink2 [overflow-wrap:anywhere] max-strip:col-start-2">
        {alertFate(alert, now, timeZone).map((line) => (
          <p key={line.text} className={line.strong ? 'font-bold text-ink' : ''}>
            {line.text}
          </p>
        ))}
      </div>
      <div className="relative z-[1] flex justify-end max-strip:col-span-2 max-strip:[&>*]:flex-1">
        {alert.state === 'open' && mayTake && (
          <Button look={chosen ? 'first' : 'plain'} onClick={onTake}>
            I have it
          </Button>
        )}
        {alert.state === 'acknowledged' && mayClear && <Button onClick={onClear}>Clear</Button>}
      </div>
    </li>
  );
}
