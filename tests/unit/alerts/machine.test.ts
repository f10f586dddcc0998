import { describe, expect, it } from 'vitest';
import { INACTIVE, step, type Timing } from '@/lib/core/alerts/machine';
import { replay, span, START } from './replay';

/** Looks are one an hour: pending 2 h, keep 3 h, rest 12 h, said again after 4 h at most twice. */
const timing: Timing = { forMs: span('2h'), keepMs: span('3h'), restMs: span('12h'), repeatMs: span('4h'), repeats: 2 };

const CASES: Array<{ name: string; looks: string; phases: string; events: string[] }> = [
  { name: 'says nothing while nothing is true', looks: '0x5', phases: '.....', events: [] },
  { name: 'opens once the condition has held for the pending time', looks: '0 1x4', phases: '.ppOO', events: ['3 opened'] },
  { name: 'forgets a condition that did not last', looks: '1x2 0 1x2 0', phases: 'pp.pp.', events: [] },
  { name: 'resolves only when it has been gone for the keep-time', looks: '1x3 0x4', phases: 'ppOkkk.', events: ['2 opened', '6 resolved'] },
  { name: 'takes a short gap for the same alert', looks: '1x3 0x2 1 0x4', phases: 'ppOkkOkkk.', events: ['2 opened', '9 resolved'] },
  { name: 'opens at once where the data prove the pending time', looks: '0 1@-5h', phases: '.O', events: ['1 opened'] },
  { name: 'counts a proof only as far as it goes', looks: '1@-1h 1@-2h', phases: 'pO', events: ['1 opened'] },
  { name: 'starts counting again where the data say that it began anew', looks: '1x2 1@0h 1@-1h 1@-2h', phases: 'ppppO', events: ['4 opened'] },
  { name: 'does not open on silence', looks: '1x2 ?x5', phases: 'ppppppp', events: [] },
  { name: 'counts anew after silence where the data prove nothing', looks: '1x2 ?x5 1x3', phases: 'pppppppppO', events: ['9 opened'] },
  { name: 'opens after silence where the data prove it', looks: '1x2 ?x5 1@-6h', phases: 'pppppppO', events: ['7 opened'] },
  { name: 'does not resolve on silence', looks: '1x3 ?x9', phases: 'ppOOOOOOOOOO', events: ['2 opened'] },
  { name: 'does not resolve on silence within the keep-time', looks: '1x3 0 ?x9', phases: 'ppOkkkkkkkkkk', events: ['2 opened'] },
  { name: 'never begins from silence', looks: '?x4', phases: '....', events: [] },
  { name: 'says it again while nobody has it, and then stops', looks: '1x16', phases: 'ppOOOOOOOOOOOOOO', events: ['2 opened', '6 repeated', '10 repeated'] },
  { name: 'does not repeat once somebody has it', looks: '1x3 take 1x9', phases: 'ppOOOOOOOOOOO', events: ['2 opened', '3 taken'] },
  { name: 'reminds the one who has it, once, at the hour they named', looks: '1x3 take@3h 1x6', phases: 'ppOOOOOOOO', events: ['2 opened', '3 taken', '6 look_again'] },
  { name: 'reminds also while the data are silent', looks: '1x3 take@3h ?x6', phases: 'ppOOOOOOOO', events: ['2 opened', '3 taken', '6 look_again'] },
  { name: 'does not remind of what has passed', looks: '1x3 take@3h 0x6', phases: 'ppOOkkk...', events: ['2 opened', '3 taken', '7 resolved'] },
  { name: 'stays in hand over a short gap', looks: '1x3 take 0 1x6', phases: 'ppOOkOOOOOO', events: ['2 opened', '3 taken'] },
  { name: 'has nothing to take where nothing is open', looks: '0 take 1 take', phases: '..pp', events: [] },
  { name: 'stays quiet about what a person cleared while it lasts', looks: '1x3 clear 1x20', phases: `ppO${'d'.repeat(21)}`, events: ['2 opened', '3 resolved by person'] },
  { name: 'speaks again when it comes back after being really gone', looks: '1x3 clear 1 0x4 1x9', phases: 'ppOddddd.pppppOOOO', events: ['2 opened', '3 resolved by person', '14 opened'] },
  { name: 'needs the whole gap after a clearing', looks: '1x3 clear 0x2 1 0x3 1', phases: 'ppOdddddddd', events: ['2 opened', '3 resolved by person'] },
  { name: 'rests between two openings', looks: '1x3 0x4 1x9', phases: 'ppOkkk.pppppppOO', events: ['2 opened', '6 resolved', '14 opened'] },
  { name: 'is over at once where it cannot be true any more', looks: '1x3 gone 0', phases: 'ppO..', events: ['2 opened', '3 resolved'] },
  { name: 'ends with its batch', looks: '1x3 end 0', phases: 'ppO..', events: ['2 opened', '3 resolved by end'] },
  { name: 'ends with its batch without a word where nothing was open', looks: '1 end 0', phases: 'p..', events: [] },
];

describe('the alert machine', () => {
  it.each(CASES)('$name', ({ looks, phases, events }) => {
    const result = replay(timing, looks);
    expect(result.phases).toBe(phases);
    expect(result.events).toEqual(events);
  });

  it('opens in the same look where no pending time is asked', () => {
    expect(replay({ ...timing, forMs: 0 }, '0 1 0x4').events).toEqual(['1 opened', '5 resolved']);
  });

  it('resolves in the same look where no keep-time is asked', () => {
    expect(replay({ ...timing, keepMs: 0 }, '1x3 0').events).toEqual(['2 opened', '3 resolved']);
  });

  it('never repeats where the rule does not ask for it', () => {
    expect(replay({ ...timing, repeatMs: null }, '1x40').events).toEqual(['2 opened']);
  });

  it('does not open early or resolve early when the clock jumps back', () => {
    const pending = step(timing, INACTIVE, { type: 'true', since: null }, START).state;
    const back = step(timing, pending, { type: 'true', since: null }, START - span('3h'));
    expect(back.events).toEqual([]);
    const open = step(timing, INACTIVE, { type: 'true', since: START - span('5h') }, START).state;
    const keeping = step(timing, open, { type: 'false' }, START + span('1h')).state;
    const earlier = step(timing, keeping, { type: 'false' }, START);
    expect(earlier.events).toEqual([]);
    expect(step(timing, earlier.state, { type: 'false' }, START + span('3h')).events).toEqual([{ type: 'resolved', by: 'data' }]);
  });

  it('does not believe a since that lies ahead', () => {
    const result = step(timing, INACTIVE, { type: 'true', since: START + span('1d') }, START);
    expect(result.state).toMatchObject({ phase: 'pending', since: START });
  });

  it('tells at most one opening and one end in each rest, however a value flaps', () => {
    for (const every of ['1m', '15m', '1h', '4h', '7h']) {
      const looks = Array.from({ length: 1000 }, (_, index) => (index % 2 ? '1' : '0')).join(' ');
      const { events } = replay({ ...timing, repeatMs: null }, looks, every);
      const openings = events.filter((event) => event.endsWith('opened')).length;
      const windows = Math.ceil((1000 * span(every)) / timing.restMs);
      expect(openings).toBeLessThanOrEqual(windows);
      expect(events.length - openings).toBeLessThanOrEqual(openings);
    }
  });
});
