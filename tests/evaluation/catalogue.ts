import type { BatchEvent, BatchSetup, DrinkKind, Reading } from '@/lib/core/types';
import { ferment, pointsFrom, type Ferment, type Must, type Truth, type TruthEvent, type Yeast } from './ferment';
import { mistell } from './mistold';
import { Random } from './random';
import { sense, usualSensor, type SensorFaults } from './sensor';

/** One simulated batch: what the core is told, and what is true. */
export interface Case {
  id: string;
  group: string;
  setup: BatchSetup;
  readings: Reading[];
  truth: Truth;
  /** True final gravity, points, of each stretch from its hour on: what the yeast could still reach were it well. */
  finals: { from: number; points: number }[];
  endH: number;
  frozen: { from: number; to: number } | null;
  /** Drift of its float, points a day. */
  driftPerDay: number;
  /** Hour of a sweetening after which it works again. */
  sweetenedAt: number | null;
}

/** The groups of the table in the analysis specification, with how many batches each has. */
export const GROUPS: readonly (readonly [string, number])[] = [
  ['healthy beer', 20],
  ['healthy cider', 14],
  ['healthy mead', 14],
  ['healthy country wine', 10],
  ['slow tail', 12],
  ['stuck by cold', 12],
  ['stuck by hunger', 12],
  ['stuck by alcohol', 12],
  ['never or late started', 10],
  ['step feeding', 12],
  ['fruit release', 12],
  ['racking step', 12],
  ['sensor drift', 12],
  ['frozen float', 12],
  ['dropouts and late delivery', 10],
  ['clock skew', 8],
  ['outlier bursts', 10],
  ['temperature excursion', 10],
  ['working again after sweetening', 10],
];

/** What people get wrong when they tell of a batch: reported apart. */
export const MISTOLD_GROUPS: readonly (readonly [string, number])[] = [
  ['yeast range 4 points off', 12],
  ['no original gravity', 8],
  ['volume off by a quarter', 8],
  ['pitch time off by hours', 8],
  ['no yeast told', 8],
];

/** The true pitch of every batch. */
export const PITCHED = Date.UTC(2026, 1, 20, 18);
const LONG_H = 24 * 160;

function yeastOf(kind: DrinkKind, r: Random): Yeast {
  const beer = kind === 'beer';
  return {
    growth: r.about(beer ? 0.16 : 0.11, 0.2),
    nitrogenHalf: r.about(0.012, 0.3),
    cellsPerNitrogen: r.about(24, 0.15),
    readiness: r.about(beer ? 0.25 : 0.08, 0.7),
    uptake: [r.about(beer ? 0.42 : 0.24, 0.25), r.about(beer ? 0.36 : 0.2, 0.25), r.about(beer ? 0.16 : 0.15, 0.3)],
    half: [r.about(4, 0.4), r.about(beer ? 8 : 7, 0.4), r.about(6, 0.4)],
    repression: [r.about(25, 0.4), r.about(25, 0.4)],
    ethanolStop: 7.89 * r.between(beer ? 10 : 14.5, beer ? 13 : 18.5),
    ethanolPower: r.between(0.35, 0.9),
    death: r.about(0.00025, 0.6),
    starvation: r.about(beer ? 0.0003 : 0.0004, 0.6),
    coldest: r.between(1, 6),
    best: r.between(28, 32),
    hottest: r.between(37, 41),
    ethanolYield: r.between(0.465, 0.49),
  };
}

function mustOf(kind: DrinkKind, r: Random): Must {
  const og = { beer: r.between(38, 68), cider: r.between(42, 66), mead: r.between(75, 118), wine: r.between(68, 100) }[kind];
  const extract = og / 0.3865;
  const share = kind === 'beer' ? r.between(0.575, 0.7) : r.between(0.92, 0.985);
  const sugar = extract * share;
  const split: [number, number, number] = kind === 'beer' ? [0.16, 0.66, 0.18] : [0.48, 0.47, 0.05];
  return {
    sugars: [sugar * split[0], sugar * split[1], sugar * split[2]],
    rest: extract - sugar,
    nitrogen: { beer: r.between(0.16, 0.28), cider: r.between(0.07, 0.14), mead: r.between(0.14, 0.26), wine: r.between(0.13, 0.24) }[kind],
    cells: { beer: r.about(0.9, 0.35), cider: r.about(0.35, 0.35), mead: r.about(0.4, 0.35), wine: r.about(0.4, 0.35) }[kind],
  };
}

/** Room temperature: a base, a daily swing, and a slow wander. */
function room(base: number, r: Random): (hour: number) => number {
  const swing = r.between(0.2, 1.5);
  const phase = r.between(0, 24);
  const slow = r.between(0, 1.2);
  const period = r.between(150, 400);
  const shift = r.between(0, period);
  return (h) => base + swing * Math.sin((2 * Math.PI * (h + phase)) / 24) + slow * Math.sin((2 * Math.PI * (h + shift)) / period);
}

const finalOf = (truth: Truth): number => truth.gravity[truth.gravity.length - 1]!;

/** First hour from `from` on at which the gravity is under `points`; null when it never is. */
function hourUnder(truth: Truth, points: number, from = 0): number | null {
  for (let k = Math.floor(from / truth.step); k < truth.gravity.length; k += 1) if (truth.gravity[k]! <= points) return k * truth.step;
  return null;
}

/** Everything that a group may bend before the batch is simulated. */
interface Draft {
  simulate: Ferment;
  kind: DrinkKind;
  yeast: Yeast;
  must: Must;
  baseC: number;
  ambient: (hour: number) => number;
  truthEvents: TruthEvent[];
  events: BatchEvent[];
  faults: SensorFaults;
  toleranceTold: number | null;
  /** A well twin tells what could be reached: healthy yeast, must and room. */
  twin: { yeast: Yeast; must: Must; ambient: (hour: number) => number } | null;
  sweetenedAt: number | null;
  endH: number | null;
}

/** `simulate` is the make of ferment it is simulated by. */
export function makeCase(group: string, index: number, seed: number, simulate: Ferment = ferment): Case {
  const r = new Random(seed, `${group} ${index}`);
  const kind = kindFor(group, r);
  const baseC = kind === 'beer' ? r.between(17.5, 21) : r.between(16.5, 22.5);
  const yeast = yeastOf(kind, r);
  const must = mustOf(kind, r);
  const draft: Draft = {
    simulate,
    kind,
    yeast,
    must,
    baseC,
    ambient: room(baseC, r),
    truthEvents: [],
    events: [],
    faults: usualSensor(r),
    toleranceTold: null,
    twin: null,
    sweetenedAt: null,
    endH: null,
  };
  const volumeL = r.pick([4.5, 5, 9, 10, 18, 20, 23]);
  const vesselL = volumeL * r.between(1.06, 1.3);
  const heatLossH = 4 + 0.6 * volumeL;
  bend(group, draft, r, volumeL, heatLossH);

  const truth = simulate(draft.yeast, draft.must, LONG_H, draft.ambient, heatLossH, draft.truthEvents);
  const finals = finalsOf(draft, heatLossH, truth);
  const og = truth.gravity[0]!;
  const endH = Math.min(75 * 24, draft.endH ?? lastOf(truth, finals, r));
  const setup = told(draft, truth, og, volumeL, vesselL, r);
  mistell(group, setup, r, finals[0]!.points, og);
  const startH = r.chance(0.8) ? r.between(-1, 0.5) : r.between(0.5, 6);
  let readings = sense(truth, draft.faults, new Random(seed, `${group} ${index} float`), PITCHED, startH, endH);
  if (group === 'pitch time off by hours') {
    const off = r.pick([-8, -5, -2, 2, 5, 8]);
    setup.pitchedAt = PITCHED + off * 3_600_000;
  }
  readings = readings.filter((reading) => reading.gravity > 0.9);
  return {
    id: `${group.replace(/\W+/g, '-')}-${index}`,
    group,
    setup,
    readings,
    truth,
    finals,
    endH,
    frozen: draft.faults.frozen,
    driftPerDay: draft.faults.driftPerDay,
    sweetenedAt: draft.sweetenedAt,
  };
}

function kindFor(group: string, r: Random): DrinkKind {
  switch (group) {
    case 'healthy beer':
      return 'beer';
    case 'healthy cider':
      return 'cider';
    case 'healthy mead':
    case 'stuck by alcohol':
      return 'mead';
    case 'healthy country wine':
      return 'wine';
    case 'stuck by hunger':
    case 'step feeding':
      return r.pick(['mead', 'wine']);
    case 'fruit release':
    case 'slow tail':
      return r.pick(['mead', 'wine', 'cider']);
    case 'working again after sweetening':
      return r.pick(['cider', 'wine', 'mead']);
    default:
      return r.pick(['beer', 'beer', 'cider', 'mead', 'wine']);
  }
}

/** The draft's own ferment as it stands, to find when things happen in it. */
function rehearse(draft: Draft, heatLossH: number, hours = 24 * 60): Truth {
  return draft.simulate(draft.yeast, draft.must, hours, draft.ambient, heatLossH, draft.truthEvents);
}

function hourAtShare(truth: Truth, share: number): number {
  const og = truth.gravity[0]!;
  return hourUnder(truth, og - share * (og - finalOf(truth))) ?? truth.gravity.length * truth.step;
}

function bend(group: string, d: Draft, r: Random, volumeL: number, heatLossH: number): void {
  switch (group) {
    case 'slow tail':
      d.yeast = { ...d.yeast, starvation: d.yeast.starvation * r.between(2, 3.5), uptake: [d.yeast.uptake[0], d.yeast.uptake[1] * 0.7, d.yeast.uptake[2] * 0.5] };
      d.must = { ...d.must, nitrogen: d.must.nitrogen * r.between(0.6, 0.8) };
      break;
    case 'stuck by cold': {
      d.yeast = { ...d.yeast, coldest: r.between(9, 12) };
      const plain = rehearse(d, heatLossH);
      const from = hourAtShare(plain, r.between(0.25, 0.6));
      const base = d.ambient;
      const cold = d.yeast.coldest - r.between(1, 4);
      const until = r.chance(0.5) ? from + r.between(140, 260) : Number.POSITIVE_INFINITY;
      d.twin = { yeast: d.yeast, must: d.must, ambient: base };
      d.ambient = (h) => (h > from && h < until ? cold + 0.2 * (base(h) - d.baseC) : base(h));
      d.endH = Math.min(from + 480, until + 300);
      break;
    }
    case 'stuck by hunger':
      d.twin = { yeast: { ...d.yeast }, must: d.must, ambient: d.ambient };
      d.must = { ...d.must, nitrogen: d.must.nitrogen * r.between(0.6, 0.95) };
      d.yeast = { ...d.yeast, starvation: r.between(0.008, 0.016), death: d.yeast.death * 2 };
      d.endH = r.between(24, 34) * 24;
      break;
    case 'stuck by alcohol': {
      const og = r.between(100, 125);
      const factor = og / 0.3865 / (d.must.sugars[0] + d.must.sugars[1] + d.must.sugars[2] + d.must.rest);
      d.must = { ...d.must, sugars: [d.must.sugars[0] * factor, d.must.sugars[1] * factor, d.must.sugars[2] * factor], rest: d.must.rest * factor };
      d.twin = { yeast: { ...d.yeast, ethanolStop: 7.89 * 14.5 }, must: d.must, ambient: d.ambient };
      d.toleranceTold = 14;
      d.yeast = { ...d.yeast, ethanolStop: 7.89 * r.between(8.5, 11), ethanolPower: r.between(0.4, 0.7), death: d.yeast.death * 5 };
      d.endH = r.between(26, 38) * 24;
      break;
    }
    case 'never or late started':
      if (r.chance(0.5)) {
        d.truthEvents.push({ hour: 0, kill: true });
        d.endH = 24 * 9;
      } else {
        d.yeast = { ...d.yeast, readiness: 1e-4 * r.about(1, 1) };
        d.must = { ...d.must, cells: d.must.cells * 0.15 };
      }
      break;
    case 'step feeding': {
      const factor = r.between(0.6, 0.75);
      d.must = { ...d.must, sugars: [d.must.sugars[0] * factor, d.must.sugars[1] * factor, d.must.sugars[2] * factor] };
      let hour = 0;
      const times = r.pick([1, 2, 2]);
      for (let k = 0; k < times; k += 1) {
        hour = Math.max(hour + 60, hourAtShare(rehearse(d, heatLossH), r.between(0.45, 0.75)));
        const sugarG = Math.round(volumeL * r.between(18, 32));
        d.truthEvents.push({ hour, sugar: sugarG / volumeL, nitrogen: 0.02 });
        if (!r.chance(0.3)) d.events.push({ at: PITCHED + hour * 3_600_000, kind: 'addition', sugarG });
      }
      break;
    }
    case 'fruit release': {
      const hour = hourAtShare(rehearse(d, heatLossH), r.between(0.5, 0.95));
      const fruitG = Math.round(volumeL * r.between(120, 250));
      d.truthEvents.push({ hour, slowSugar: (fruitG * r.between(0.06, 0.14)) / volumeL, release: r.between(15, 50), nitrogen: 0.03 });
      d.events.push({ at: PITCHED + hour * 3_600_000, kind: 'addition', fruitG });
      break;
    }
    case 'racking step': {
      const hour = hourAtShare(rehearse(d, heatLossH), r.between(0.8, 0.99));
      d.truthEvents.push({ hour, keepCells: r.between(0.4, 0.7) });
      d.faults.steps.push({ hour, points: r.between(2, 5) * (r.chance(0.5) ? 1 : -1) });
      if (!r.chance(0.4)) d.events.push({ at: PITCHED + hour * 3_600_000, kind: 'rack' });
      break;
    }
    case 'sensor drift':
      d.faults.driftPerDay = r.between(0.2, 0.5) * (r.chance(0.5) ? 1 : -1);
      break;
    case 'frozen float': {
      const from = hourAtShare(rehearse(d, heatLossH), r.between(0.15, 0.9)) + r.between(0, 24);
      d.faults.frozen = { from, to: from + r.between(48, 140) };
      break;
    }
    case 'dropouts and late delivery': {
      let hour = r.between(10, 50);
      for (let k = 0; k < 5; k += 1) {
        const to = hour + r.between(7, 60);
        d.faults.gaps.push({ from: hour, to, late: r.chance(0.5) });
        hour = to + r.between(20, 120);
      }
      break;
    }
    case 'clock skew':
      d.faults.clockErrorH = r.pick([-8, -5, -3, -1, 1, 3]);
      break;
    case 'outlier bursts':
      d.faults.bursts = r.between(4, 10);
      d.faults.outlierShare = r.between(0.02, 0.06);
      break;
    case 'temperature excursion': {
      const base = d.ambient;
      const from = r.between(24, 200);
      const to = from + r.between(14, 60);
      const by = r.between(6, 10) * (r.chance(0.5) ? 1 : -1);
      d.ambient = (h) => base(h) + (h > from && h < to ? by : 0);
      break;
    }
    case 'working again after sweetening': {
      const plain = rehearse(d, heatLossH, 24 * 100);
      const end = hourUnder(plain, finalOf(plain) + 0.4) ?? 24 * 40;
      const hour = Math.min(end + r.between(120, 200), 24 * 50);
      const sugarG = Math.round(volumeL * r.between(15, 30));
      d.yeast = { ...d.yeast, death: d.yeast.death * 0.4, starvation: d.yeast.starvation * 0.4, ethanolStop: 7.89 * 19 };
      d.truthEvents.push({ hour, sugar: sugarG / volumeL });
      d.events.push({ at: PITCHED + hour * 3_600_000, kind: 'addition', sugarG });
      d.sweetenedAt = hour;
      d.endH = hour + 24 * 16;
      break;
    }
    default:
      break;
  }
}

/** Gravity, points, once all the sugar of a must, and what was added to it in g/L, has gone. */
function dryOf(must: Must, yeast: Yeast, added = 0): number {
  const sugar = must.sugars[0] + must.sugars[1] + must.sugars[2] + added;
  return pointsFrom(must.rest + 0.03 * sugar, yeast.ethanolYield * sugar);
}

/** The alcohol has come near what its yeast bears, and brought it to its end. */
const endsByAlcohol = (d: Draft, truth: Truth): boolean => truth.ethanol[truth.ethanol.length - 1]! > 0.9 * d.yeast.ethanolStop;

/** More sugar than this left by yeast that could still bear the alcohol, in points, is no end but a stall. */
const LEFT_BY_A_STALL = 6;

/**
 * What each stretch could reach: the batch itself in the long run, its well twin where it was
 * spoilt, and all its sugar where its own yeast tired with much of it left.
 */
function finalsOf(d: Draft, heatLossH: number, truth: Truth): { from: number; points: number }[] {
  const source = d.twin ?? { yeast: d.yeast, must: d.must, ambient: d.ambient };
  const sugary = d.truthEvents.filter((event) => event.sugar || event.slowSugar);
  const killed = d.truthEvents.some((event) => event.kill);
  return [0, ...sugary.map((event) => event.hour)].map((from, k) => {
    if (!d.twin && !killed && k === sugary.length) {
      const dry = dryOf(d.must, d.yeast, sugary.reduce((sum, event) => sum + (event.sugar ?? 0) + (event.slowSugar ?? 0), 0));
      const stalls = !endsByAlcohol(d, truth) && finalOf(truth) > dry + LEFT_BY_A_STALL;
      return { from, points: stalls ? dry : finalOf(truth) };
    }
    const events = killed ? [] : d.truthEvents.filter((event) => event.hour <= from && (event.hour > 0 || k > 0));
    return { from, points: finalOf(d.simulate(source.yeast, source.must, LONG_H, source.ambient, heatLossH, events)) };
  });
}

/** When the log ends: about two weeks after it is really done. */
function lastOf(truth: Truth, finals: { from: number; points: number }[], r: Random): number {
  const last = finals[finals.length - 1]!;
  const done = hourUnder(truth, last.points + 0.5, last.from) ?? 24 * 60;
  return Math.max(24 * 12, done + 24 * r.between(11, 17));
}

function told(d: Draft, truth: Truth, og: number, volumeL: number, vesselL: number, r: Random): BatchSetup {
  const source = d.twin ?? d;
  const attenuation = 1 - dryOf(d.must, source.yeast) / og;
  const half = r.between(0.03, 0.06);
  const mid = attenuation + r.normal(0, 0.7 * half);
  const most = truth.ethanol[truth.ethanol.length - 1]!;
  const limited = endsByAlcohol(d, truth) && !d.twin;
  const tolerance = d.toleranceTold ?? (limited ? most / 7.89 + r.normal(0, 0.6) : source.yeast.ethanolStop / 7.89 + r.normal(0, 0.6));
  return {
    kind: d.kind,
    pitchedAt: PITCHED,
    originalGravity: Math.round((1 + (og + r.normal(0, 0.7)) / 1000) * 1000) / 1000,
    volumeL,
    vesselL,
    attenuation: { min: mid - half, max: mid + half },
    alcoholToleranceAbv: Math.round(tolerance * 2) / 2,
    temperature: { minC: Math.round(d.baseC - 3), maxC: Math.round(d.baseC + 4) },
    neck: 'blow_off',
    events: d.events,
    timeZone: 'UTC',
  };
}

export function* catalogue(seed: number, groups: readonly (readonly [string, number])[], simulate: Ferment = ferment): Generator<Case> {
  for (const [group, count] of groups) for (let i = 0; i < count; i += 1) yield makeCase(group, i, seed, simulate);
}
