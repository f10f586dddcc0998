import { expect, it } from 'vitest';
import { INACTIVE, step, type AlertState, type Look, type Timing } from '@/lib/core/alerts/machine';
import { seeded } from '../../support/random';

const HOUR = 3_600_000;

/** The same promise written the plain way: a bag of variables, read top to bottom. */
class Reference {
  up = false;
  muted = false;
  trueFrom: number | null = null;
  falseFrom: number | null = null;
  broken = false;
  last: number | null = null;
  told = 0;
  said = 0;
  taken = false;
  again: number | null = null;

  constructor(private readonly t: Timing) {}

  look(look: Look, now: number): string[] {
    if (look.type === 'end') return this.over(this.up ? ['resolved end'] : [], null);
    if (look.type === 'gone') return this.over(this.up ? ['resolved data'] : [], this.last);
    if (look.type === 'take') return this.up ? ((this.taken = true), (this.again = look.lookAgainAt), ['taken']) : [];
    if (look.type === 'release') {
      if (this.up && this.taken) Object.assign(this, { taken: false, again: null, told: now });
      return [];
    }
    if (look.type === 'clear') return this.up ? ((this.up = false), (this.muted = true), ['resolved person']) : [];
    if (look.type === 'silence') {
      this.broken ||= !this.up && !this.muted && this.trueFrom !== null;
      return this.up && this.falseFrom === null ? this.remind(now) : [];
    }
    if (look.type === 'false') {
      if (!this.up && !this.muted) return this.over([], this.last);
      this.falseFrom = Math.min(this.falseFrom ?? now, now);
      if (now - this.falseFrom < this.t.keepMs) return [];
      return this.over(this.up ? ['resolved data'] : [], this.last);
    }
    this.falseFrom = null;
    if (this.muted) return [];
    if (this.up) {
      if (this.taken) return this.remind(now);
      if (this.t.repeatMs === null || this.said >= this.t.repeats || now - this.told < this.t.repeatMs) return [];
      this.told = now;
      this.said += 1;
      return ['repeated'];
    }
    const seen = this.trueFrom === null || this.broken ? now : this.trueFrom;
    this.trueFrom = Math.min(look.since ?? seen, now);
    this.broken = false;
    if (now - this.trueFrom < this.t.forMs || (this.last !== null && now - this.last < this.t.restMs)) return [];
    Object.assign(this, { up: true, last: now, told: now, said: 0, taken: false, again: null });
    return ['opened'];
  }

  private remind(now: number): string[] {
    if (!this.taken || this.again === null || now < this.again) return [];
    this.again = null;
    return ['look_again'];
  }

  private over(events: string[], last: number | null): string[] {
    Object.assign(this, { up: false, muted: false, trueFrom: null, falseFrom: null, broken: false, taken: false, again: null, last });
    return events;
  }
}

function randomLook(random: () => number, now: number): Look {
  const r = random();
  if (r < 0.42) return { type: 'true', since: random() < 0.5 ? null : now - Math.floor((random() - 0.1) * 8 * HOUR) };
  if (r < 0.74) return { type: 'false' };
  if (r < 0.85) return { type: 'silence' };
  if (r < 0.9) return { type: 'take', lookAgainAt: random() < 0.5 ? null : now + Math.floor(random() * 6 * HOUR) };
  if (r < 0.93) return { type: 'release' };
  if (r < 0.97) return { type: 'clear' };
  return r < 0.99 ? { type: 'gone' } : { type: 'end' };
}

const said = (events: readonly { type: string }[]) => events.map((event) => (event.type === 'resolved' ? `resolved ${(event as { by?: string }).by}` : event.type));

it.each([1, 2, 3, 4, 5, 6, 7, 8])('does what the plain model does over 10,000 random looks (seed %i)', (seed) => {
  const random = seeded(seed);
  const span = (most: number) => Math.floor(random() * most) * HOUR;
  const timing: Timing = { forMs: span(4), keepMs: span(4), restMs: span(24), repeatMs: random() < 0.3 ? null : span(6) + HOUR, repeats: Math.floor(random() * 4) };
  const model = new Reference(timing);
  let state: AlertState = INACTIVE;
  let now = Date.UTC(2026, 0, 1);
  const pairs = new Set<string>();
  let differences = 0;
  for (let index = 0; index < 10_000; index += 1) {
    // Mostly forward, now and then the clock is set back.
    now += random() < 0.02 ? -Math.floor(random() * HOUR) : Math.floor(random() * 2 * HOUR);
    const look = randomLook(random, now);
    pairs.add(`${state.phase} ${look.type}`);
    const result = step(timing, state, look, now);
    state = result.state;
    const expected = model.look(look, now);
    if (said(result.events).join() !== expected.join()) differences += 1;
  }
  expect(differences).toBe(0);
  // Every phase has met every look, so nothing above went untried.
  const phases = timing.forMs === 0 && timing.restMs === 0 ? 4 : 5;
  expect(pairs.size).toBeGreaterThanOrEqual((phases - (timing.keepMs === 0 ? 1 : 0)) * 8);
});
