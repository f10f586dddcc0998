import { INACTIVE, step, type AlertState, type Look, type Timing } from '@/lib/core/alerts/machine';

const UNITS: Record<string, number> = { m: 60_000, h: 3_600_000, d: 86_400_000 };
const PHASES: Record<AlertState['phase'], string> = { inactive: '.', pending: 'p', open: 'O', keeping: 'k', dismissed: 'd' };
export const START = Date.UTC(2026, 2, 1);

/** `90m`, `-3h`, `2d` in milliseconds. */
export function span(text: string): number {
  const match = /^(-?\d+)([mhd])$/.exec(text);
  if (!match) throw new Error(`not a span: ${text}`);
  return Number(match[1]) * UNITS[match[2]!]!;
}

/**
 * A series of looks in short: `0` false, `1` true, `?` silence, `take`, `clear`,
 * `gone`, `end`; `x3` three times; `1@-4h` true, and proven since four hours ago;
 * `take@2h` will look again in two hours.
 */
function parse(series: string): Array<{ look: (now: number) => Look }> {
  return series.split(/\s+/).flatMap((token) => {
    const match = /^(0|1|\?|take|clear|gone|end)(?:@(-?\d+[mhd]))?(?:x(\d+))?$/.exec(token);
    if (!match) throw new Error(`not a look: ${token}`);
    const [, what, at, times] = match;
    const look = (now: number): Look => {
      const instant = at === undefined ? null : now + span(at);
      if (what === '1') return { type: 'true', since: instant };
      if (what === '0') return { type: 'false' };
      if (what === '?') return { type: 'silence' };
      if (what === 'take') return { type: 'take', lookAgainAt: instant };
      return { type: what as 'clear' | 'gone' | 'end' };
    };
    return Array.from({ length: Number(times ?? 1) }, () => ({ look }));
  });
}

/** Plays the looks, one every `every`, and writes one letter a look and the events as `3 opened`. */
export function replay(timing: Timing, series: string, every = '1h'): { phases: string; events: string[]; state: AlertState } {
  let state = INACTIVE;
  let phases = '';
  const events: string[] = [];
  parse(series).forEach(({ look }, index) => {
    const now = START + index * span(every);
    const result = step(timing, state, look(now), now);
    // Through JSON, as the database keeps it.
    state = JSON.parse(JSON.stringify(result.state)) as AlertState;
    phases += PHASES[state.phase];
    for (const event of result.events) events.push(`${index} ${event.type}${event.type === 'resolved' && event.by !== 'data' ? ` by ${event.by}` : ''}`);
  });
  return { phases, events, state };
}
