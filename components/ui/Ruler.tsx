import type { StateWord } from '@/lib/core/calls/attention';
import { stateColour } from './StateMark';

export interface RulerProps {
  /** What the number is, at the right above the line: `fall in the last 24 h`. */
  name: string;
  value: number;
  /** As it is written: `0.1 points`. */
  says: string;
  /** The limit, with the word that stands under its post: `1 needed`. */
  limit: number | null;
  limitSays: string;
  /** Which side of the limit is good; draws the range band there. */
  good: 'above' | 'below' | null;
  state: StateWord;
  from?: number;
  to?: number;
}

const STEPS = [1, 2, 2.5, 5, 10];

/** Least round number at or above `value`: the end of a scale that starts at zero. */
export function scaleEnd(value: number): number {
  if (!(value > 0)) return 1;
  const power = 10 ** Math.floor(Math.log10(value));
  return (STEPS.find((step) => step * power >= value * 0.9999) ?? 10) * power;
}

const clamp = (share: number) => Math.min(1, Math.max(0, share));
const short = (value: number) => String(Number(value.toPrecision(6)));

/** One number against its limit: the range that is good, a post at the limit, a pointer with the value. */
export function Ruler({ name, value, says, limit, limitSays, good, state, from, to }: RulerProps) {
  const low = from ?? Math.min(0, value, limit ?? 0);
  const high = to ?? scaleEnd(Math.max(value, limit ?? value, 0) * (limit === null ? 1.25 : 2));
  const at = (number: number) => clamp((number - low) / (high - low || 1)) * 100;
  const pointer = at(value);
  const post = limit === null ? null : at(limit);
  const over = value > high ? ', beyond the ruler' : '';
  const colour = stateColour(state);
  return (
    <div role="img" aria-label={`${name}: ${says}${over}${limit === null ? '' : `; limit ${limitSays}`}`} className="my-1 font-mono">
      <div className="flex items-baseline justify-between gap-3 text-[0.75rem] leading-[1.125rem] text-ink2" aria-hidden>
        <span className={`whitespace-nowrap font-semibold ${colour}`} style={{ marginLeft: `min(${pointer}%, 60%)` }}>
          {says}
        </span>
        <span className="text-right text-[0.6875rem]">{name}</span>
      </div>
      <div className="relative h-4" aria-hidden>
        {post !== null && good && (
          <span className="absolute top-1 h-[9px] bg-range" style={good === 'above' ? { left: `${post}%`, right: 0 } : { left: 0, width: `${post}%` }} />
        )}
        <span className="absolute inset-x-0 top-[13px] h-px bg-ink2" />
        {post !== null && <span className="absolute -top-px h-[18px] w-[2px] -translate-x-1/2 bg-ink" style={{ left: `${post}%` }} />}
        <svg viewBox="0 0 10 8" width="11" height="9" className={`absolute top-[2px] -translate-x-1/2 ${colour}`} style={{ left: `${pointer}%` }}>
          <path d="M0 0h10L5 8Z" fill="currentColor" />
        </svg>
      </div>
      <div className="relative h-4 text-[0.6875rem] leading-4 text-ink2" aria-hidden>
        {(post === null || post > 22) && <span className="absolute left-0">{short(low)}</span>}
        {post !== null && (
          <span className="absolute whitespace-nowrap font-semibold text-ink" style={post > 70 ? { right: `${100 - post}%` } : { left: `${post}%`, transform: post > 12 ? 'translateX(-50%)' : undefined }}>
            {limitSays}
          </span>
        )}
        {(post === null || post < 78) && <span className="absolute right-0">{short(high)}</span>}
      </div>
    </div>
  );
}
