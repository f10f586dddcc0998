/** How long judgements and refusals take: one of 90 days, all of a cellar's, and input that cannot be fitted. */
import { assess, assessEvery } from '../../lib/core/assess';
import { fitModel, MODEL_NAMES, modelGravity } from '../../lib/core/fit/models';
import type { BatchSetup, Reading } from '../../lib/core/types';
import { Random } from '../../tests/evaluation/random';

const DAY_MS = 86_400_000;
const PITCHED_AT = Date.UTC(2026, 1, 1);
const READINGS = 8640;

/** Gravity, points, by day of batches that end, creep or stick; each is judged at day 90. */
const FERMENTS: Record<'ended' | 'slow' | 'stuck', { kind: BatchSetup['kind']; points: number; at: (day: number) => number }> = {
  ended: { kind: 'cider', points: 50, at: (day) => modelGravity('logistic', [50, 0, 0.8, 5], day) },
  slow: { kind: 'mead', points: 95, at: (day) => 95 * Math.exp(-Math.max(0, day - 1) / 30) },
  stuck: { kind: 'mead', points: 80, at: (day) => modelGravity('logistic', [80, 32, 0.8, 4], day) },
};

function batch(name: keyof typeof FERMENTS, days = 90, seed = 1): { setup: BatchSetup; readings: Reading[] } {
  const { kind, points, at } = FERMENTS[name];
  const random = new Random(seed, `assess ${name}`);
  const readings = Array.from({ length: (READINGS * days) / 90 }, (_, i) => ({
    at: PITCHED_AT + i * 900_000,
    gravity: 1 + (at(i / 96) + random.normal(0, 0.5)) / 1000,
    temperature: 19 + random.normal(0, 0.3),
  }));
  const setup: BatchSetup = { kind, pitchedAt: PITCHED_AT, originalGravity: 1 + points / 1000, volumeL: 9, vesselL: 11, attenuation: null, alcoholToleranceAbv: 15, temperature: { minC: 16, maxC: 23 }, events: [] };
  return { setup, readings };
}

const timed = (work: () => void): number => {
  const begun = performance.now();
  work();
  return performance.now() - begun;
};

const middle = (list: number[]): number => list.sort((a, b) => a - b)[list.length >> 1]!;

/** Median time, ms, of one assessment of 8,640 readings, warm, by what the batch does; and the verdict on its stall, to show that it is what it is called. */
export function assessments(): Record<string, { ms: number; stalled: string; stage: string }> {
  const result: Record<string, { ms: number; stalled: string; stage: string }> = {};
  for (const name of Object.keys(FERMENTS) as (keyof typeof FERMENTS)[]) {
    const { setup, readings } = batch(name);
    const judge = () => assess(setup, readings, PITCHED_AT + 90 * DAY_MS);
    for (let i = 0; i < 20; i += 1) judge();
    const { calls, stage } = judge().assessment;
    result[name] = { ms: middle(Array.from({ length: 31 }, () => timed(judge))), stalled: calls.stalled.headline, stage };
  }
  return result;
}

/** Seconds for a hundred batches of 30 days, each judged every six hours of its life. */
export function cellarHistory(): number {
  const names = Object.keys(FERMENTS) as (keyof typeof FERMENTS)[];
  const cellar = Array.from({ length: 100 }, (_, i) => batch(names[i % names.length]!, 30, i));
  const times = Array.from({ length: 120 }, (_, i) => PITCHED_AT + (i + 1) * (DAY_MS / 4));
  const ms = timed(() => {
    for (const { setup, readings } of cellar) for (const judgement of assessEvery(setup, readings, times, { picture: false })) void judgement;
  });
  return ms / 1000;
}

/** Longest time, ms, until a curve says `no fit` to input that has none; throws where one is fitted all the same. */
export function refusals(): { ms: number; input: string } {
  const days = Float64Array.from({ length: 3000 }, (_, i) => i / 200);
  const fall = days.map((day) => modelGravity('logistic', [60, 8, 0.9, 4], day));
  const million = Float64Array.from({ length: 1_000_000 }, (_, i) => i / 10_000);
  const inputs: Record<string, [Float64Array, Float64Array]> = {
    'no points': [new Float64Array(0), new Float64Array(0)],
    'three points': [days.slice(0, 3), fall.slice(0, 3)],
    'one that is no number': [days, fall.map((value, i) => (i === 1500 ? Number.NaN : value))],
    'one without end': [days, fall.map((value, i) => (i === 9 ? Number.POSITIVE_INFINITY : value))],
    'a level line': [days, days.map(() => 50)],
    'all at one time': [days.map(() => 3), fall],
    'a million points': [million, million.map((day) => 60 - day / 2)],
  };
  let worst = { ms: 0, input: '' };
  for (const [input, [t, g]] of Object.entries(inputs)) {
    for (const model of MODEL_NAMES) {
      let reason = '';
      const ms = timed(() => (reason = fitModel(model, t, g).reason));
      if (reason !== 'no fit') throw new Error(`${model} was fitted to ${input}`);
      if (ms > worst.ms) worst = { ms, input };
    }
  }
  return worst;
}
