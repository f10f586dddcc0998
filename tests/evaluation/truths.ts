import { OVERDUE_H } from '@/lib/core/stages/watch';
import { gasLPerH, swapGasLPerH } from '@/lib/core/gas/gas';
import type { Case } from './catalogue';

/** The statements that are scored. */
export const DECISIONS = [
  'started',
  'overdue start',
  'past peak',
  'airlock ok',
  'sluggish',
  'stuck',
  'terminal',
  'ready to rack',
  'ready to bottle',
  'sensor frozen',
  'sensor drifting',
  'working again',
  'temperature',
] as const;
export type Decision = (typeof DECISIONS)[number];

/** Hours after the truth within which a statement still counts as in time. */
export const LIMIT_H: Record<Decision, number> = {
  started: 24,
  'overdue start': 12,
  'past peak': 36,
  'airlock ok': 48,
  sluggish: 96,
  stuck: 120,
  terminal: 96,
  'ready to rack': 72,
  'ready to bottle': 144,
  'sensor frozen': 24,
  'sensor drifting': 168,
  'working again': 96,
  temperature: 6,
};

/** Points a day from which a float is said to drift. */
const DRIFTS = 0.1;

/** Hours after a logged racking in which it is not said that it may be racked. */
const RACKED_LATELY_H = 96;

/** Hours before the truth from which a statement that is already acceptable counts. */
const EARLY_H = 48;

/** What is true of one batch, by hours since its true pitch. */
export class Truths {
  private readonly step: number;
  private readonly last: number;
  private readonly swap: number;
  private readonly peaks: { from: number; to: number; at: number }[] = [];

  constructor(readonly batch: Case) {
    this.step = batch.truth.step;
    this.last = batch.truth.gravity.length - 1;
    this.swap = swapGasLPerH(batch.setup.kind, batch.setup.volumeL, batch.setup.vesselL);
    batch.finals.forEach((stretch, i) => {
      const to = batch.finals[i + 1]?.from ?? batch.truth.gravity.length * this.step;
      let at = stretch.from;
      for (let h = stretch.from; h < to; h += this.step) if (this.rate(h) > this.rate(at)) at = h;
      this.peaks.push({ from: stretch.from, to, at });
    });
  }

  private index(hour: number): number {
    return Math.max(0, Math.min(this.last, Math.round(hour / this.step)));
  }

  gravity(hour: number): number {
    return this.batch.truth.gravity[this.index(hour)]!;
  }

  rate(hour: number): number {
    return this.batch.truth.rate[this.index(hour)]!;
  }

  temperature(hour: number): number {
    return this.batch.truth.temperature[this.index(hour)]!;
  }

  gas(hour: number): number {
    return gasLPerH(this.rate(hour), this.batch.setup.volumeL);
  }

  final(hour: number): number {
    let points = this.batch.finals[0]!.points;
    for (const stretch of this.batch.finals) if (stretch.from <= hour) points = stretch.points;
    return points;
  }

  remaining(hour: number): number {
    return this.gravity(hour) - this.final(hour);
  }

  private first(from: number, test: (hour: number) => boolean): number | null {
    for (let h = from; h <= this.batch.endH; h += this.step) if (test(h)) return h;
    return null;
  }

  private get lastStretch(): number {
    return this.batch.finals[this.batch.finals.length - 1]!.from;
  }

  private started(): number | null {
    return this.first(0, (h) => this.gravity(0) - this.gravity(h) >= 1);
  }

  /** Falls less than 0.4 points a day over the next three days with more than 6 points to be had. */
  private isStuck(h: number): boolean {
    return this.gravity(h) - this.gravity(h + 72) < 1.2 && this.remaining(h) > 6;
  }

  private outside(h: number, margin: number): boolean {
    const range = this.batch.setup.temperature!;
    const t = this.temperature(h);
    return t < range.minC - margin || t > range.maxC + margin;
  }

  /** Whether a racking was logged so near an hour that nobody needs to be told of another. */
  private rackedAbout(hour: number): boolean {
    return this.batch.setup.events.some((event) => {
      const racked = (event.at - this.batch.setup.pitchedAt!) / 3_600_000;
      return event.kind === 'rack' && racked > hour - RACKED_LATELY_H && racked < hour + LIMIT_H['ready to rack'];
    });
  }

  /** Hours at which each statement becomes true; most have one at most. */
  moments(decision: Decision): number[] {
    const one = (hour: number | null): number[] => (hour === null ? [] : [hour]);
    const { batch } = this;
    const single = batch.finals.length === 1;
    switch (decision) {
      case 'started':
        return one(this.started());
      case 'overdue start': {
        const limit = OVERDUE_H[batch.setup.kind];
        return this.gravity(0) - this.gravity(limit) < 1 ? [limit] : [];
      }
      case 'past peak':
        return single && this.started() !== null ? [this.peaks[0]!.at] : [];
      case 'airlock ok': {
        if (!single || this.gas(this.peaks[0]!.at) < this.swap) return [];
        let hour = batch.endH;
        while (hour > 0 && this.gas(hour) < this.swap) hour -= this.step;
        return hour >= batch.endH ? [] : [hour + this.step];
      }
      case 'sluggish': {
        const from = this.peaks[this.peaks.length - 1]!.at;
        if (this.started() === null) return [];
        return one(
          // What has stopped is stuck, not slow.
          this.first(Math.max(48, from), (h) => this.rate(h) > 0.4 && this.rate(h) < 1.6 && this.remaining(h) > 9 && this.remaining(h + 144) > 1 && !this.isStuck(h) && this.rate(h + 36) < 1.9 && !this.isStuck(h + 60)),
        );
      }
      case 'stuck': {
        const begun = this.started();
        return begun === null ? [] : one(this.first(Math.max(begun + 12, this.lastStretch), (h) => this.isStuck(h)));
      }
      case 'terminal':
        return one(this.first(this.lastStretch + 1, (h) => this.remaining(h) <= 1));
      case 'ready to rack':
        return one(this.first(this.lastStretch + 1, (h) => this.remaining(h) <= 2)).filter((hour) => !this.rackedAbout(hour));
      case 'ready to bottle':
        return one(this.first(this.lastStretch + 1, (h) => this.remaining(h) <= 0.5));
      case 'sensor frozen':
        return batch.frozen ? [batch.frozen.from] : [];
      case 'sensor drifting':
        // Only a climb can be told from a ferment: four days in which it outruns what still falls.
        return batch.driftPerDay < DRIFTS ? [] : one(this.first(96, (h) => this.gravity(h) - this.gravity(h + 96) < 0.3 * 4 * batch.driftPerDay));
      case 'working again':
        return batch.sweetenedAt === null ? [] : one(this.first(batch.sweetenedAt, (h) => this.gravity(batch.sweetenedAt! + 1) - this.gravity(h) >= 1));
      case 'temperature': {
        const moments: number[] = [];
        let run = 0;
        let fresh = true;
        for (let h = 0; h <= batch.endH; h += this.step) {
          if (this.outside(h, 0.5)) run += this.step;
          else {
            run = 0;
            if (!this.outside(h, 0.2)) fresh = true;
          }
          if (run >= 3 && fresh) {
            moments.push(h);
            fresh = false;
          }
        }
        return moments;
      }
    }
  }

  /** Whether a statement made at an hour is acceptably true. */
  acceptable(decision: Decision, hour: number): boolean {
    const { batch } = this;
    switch (decision) {
      case 'started':
        return this.gravity(0) - this.gravity(hour) >= 0.5;
      case 'overdue start':
        return hour >= 0.9 * OVERDUE_H[batch.setup.kind] && this.gravity(0) - this.gravity(hour) < 2.5;
      case 'past peak':
        return this.peaks.some((one) => hour >= one.from - 1 && hour < one.to + 12 && (hour >= one.at - 6 || this.rate(hour) < 0.9 * this.rate(one.at)) && hour >= one.at - 24);
      case 'airlock ok': {
        // Half a day of grace for sugar that has just gone in.
        if (batch.finals.some((stretch) => stretch.from > 0 && hour >= stretch.from && hour < stretch.from + 12)) return true;
        for (let h = hour; h <= hour + 48; h += 1) {
          // What goes in later is not known yet.
          if (batch.finals.some((stretch) => stretch.from > hour && stretch.from <= h)) return true;
          if (this.gas(h) > 1.15 * this.swap) return false;
        }
        return true;
      }
      case 'sluggish':
        return this.rate(hour - 12) < 3 && this.remaining(hour) > 4.5;
      case 'stuck':
        // Half a day of grace either way: nobody sees a stall, or its end, at once.
        return [hour, hour - 12].some((h) => this.gravity(h - 48) - this.gravity(h) < 1.8 && this.remaining(h) > 3);
      case 'terminal':
        return this.remaining(hour) <= 2;
      case 'ready to rack':
        return this.remaining(hour) <= 3;
      case 'ready to bottle':
        return this.remaining(hour) <= 1;
      case 'sensor frozen':
        return batch.frozen !== null && hour >= batch.frozen.from && hour <= batch.frozen.to + 14;
      case 'sensor drifting':
        return Math.abs(batch.driftPerDay) >= DRIFTS;
      case 'working again':
        return batch.sweetenedAt !== null && hour > batch.sweetenedAt;
      case 'temperature': {
        for (let h = hour - 3; h <= hour; h += 0.5) if (this.outside(h, 0.05)) return true;
        return false;
      }
    }
  }

  /** The window in which a first statement counts for a moment. */
  window(decision: Decision, moment: number): [number, number] {
    return [moment - EARLY_H, moment + LIMIT_H[decision]];
  }
}
