import { typedNumber } from '@/components/batch/figures';
import { benchForm, doneOf, type BenchFacts, type BenchForm, type PrimingForm, type WEIGHED_SUGARS } from '@/lib/contracts/bench';
import type { BenchRequest, Priming } from '@/lib/core/bottling/bench';
import { BOTTLES, type BottleKind, type Closure } from '@/lib/core/bottling/bottles';
import { primingSugar, syrup, USUAL_DROP_G, usualDrops } from '@/lib/core/bottling/priming';
import { sentencesOf, firstOf } from '@/lib/contracts/issues';

export type SugarWay = 'none' | 'weighed' | 'syrup' | 'drops';
export type WeighedSugar = Exclude<(typeof WEIGHED_SUGARS)[number], 'syrup'>;

/** One row of bottles as it is typed. */
export interface BottleRow {
  key: string;
  kind: BottleKind;
  closure: Closure;
  size: string;
  /** The maker's figure, bar; empty: nobody has looked. */
  confirmed: string;
  /** Empty: enough. */
  atHand: string;
  drops: string;
}

/** The bench as it is typed. */
export interface BenchDraft {
  volume: string;
  losses: string;
  cellar: string;
  warmest: string;
  warmestSinceEnd: string;
  bottles: BottleRow[];
  way: SugarWay;
  sugar: WeighedSugar;
  /** Share of sugar in the syrup, %. */
  syrupShare: string;
  volumes: number;
  /** Grams a drop; empty: as drops usually weigh. */
  dropGrams: string;
}

export function newRow(kind: BottleKind, sizeMl: number, taken: readonly string[]): BottleRow {
  const base = `${kind}-${sizeMl}`;
  let key = base;
  for (let n = 2; taken.includes(key); n += 1) key = `${base}-${n}`;
  return { key, kind, closure: BOTTLES[kind].closures[0]!, size: String(sizeMl), confirmed: '', atHand: '', drops: String(usualDrops(sizeMl / 1000)) };
}

/** Where nobody has said anything: still, beer bottles, a cellar and a warm room. */
export function newDraft(facts: BenchFacts): BenchDraft {
  return {
    volume: String(facts.batch.volume_l),
    losses: '0.3',
    cellar: '12',
    warmest: '25',
    warmestSinceEnd: facts.warmest_since_end_c === null ? '' : facts.warmest_since_end_c.toFixed(1),
    bottles: [newRow('beer', 500, [])],
    way: 'weighed',
    sugar: 'sucrose',
    syrupShare: '50',
    volumes: 2.4,
    dropGrams: '',
  };
}

const number = (text: string) => typedNumber(text) ?? Number.NaN;
const orNull = (text: string) => (text.trim() === '' ? null : number(text));

function primingOf(draft: BenchDraft): PrimingForm {
  switch (draft.way) {
    case 'none':
      return { way: 'none' };
    case 'weighed':
      return { way: 'weighed', sugar: draft.sugar, syrup_share: null, wanted_volumes: draft.volumes };
    case 'syrup':
      return { way: 'weighed', sugar: 'syrup', syrup_share: number(draft.syrupShare) / 100, wanted_volumes: draft.volumes };
    case 'drops': {
      const grams = orNull(draft.dropGrams);
      return { way: 'drops', grams_each: grams === null ? { ...USUAL_DROP_G } : { lo: grams, value: grams, hi: grams } };
    }
  }
}

export type BenchErrors = Record<string, string>;

/** The draft as it is sent, or what is wrong with it by the contract's own names. */
export function formOf(draft: BenchDraft, facts: BenchFacts): { form: BenchForm; errors: null } | { form: null; errors: BenchErrors } {
  const parsed = benchForm.safeParse({
    volume_l: number(draft.volume),
    losses_l: number(draft.losses),
    bottles: draft.bottles.map((row) => ({ key: row.key, kind: row.kind, closure: row.closure, size_ml: number(row.size), confirmed_bar: orNull(row.confirmed), at_hand: orNull(row.atHand), drops: draft.way === 'drops' ? number(row.drops) : 0 })),
    cellar_c: number(draft.cellar),
    warmest_store_c: number(draft.warmest),
    warmest_since_end_c: orNull(draft.warmestSinceEnd),
    priming: primingOf(draft),
  });
  if (!parsed.success) return { form: null, errors: firstOf(sentencesOf(parsed.error.issues)) };
  const form = parsed.data;
  const { vessel_l } = facts.batch;
  const volume = form.volume_l ?? facts.batch.volume_l;
  if (volume > vessel_l + 1e-6) return { form: null, errors: { volume_l: `the vessel holds ${vessel_l} L` } };
  if (form.losses_l > volume) return { form: null, errors: { losses_l: `must be at most ${volume} L` } };
  if (form.warmest_store_c < form.cellar_c) return { form: null, errors: { warmest_store_c: `must be at least ${form.cellar_c} °C` } };
  if (form.warmest_since_end_c === null && facts.warmest_since_end_c === null) return { form: null, errors: { warmest_since_end_c: 'how warm was it at most since it finished?' } };
  return { form, errors: null };
}

function corePriming(priming: PrimingForm, bottles: BenchForm['bottles']): Priming {
  if (priming.way === 'none') return { way: 'none' };
  if (priming.way === 'drops') return { way: 'drops', gramsEach: priming.grams_each, drops: Object.fromEntries(bottles.map((bottle) => [bottle.key, bottle.drops])) };
  return { way: 'weighed', sugar: priming.sugar === 'syrup' ? syrup(priming.syrup_share ?? 1) : primingSugar(priming.sugar), wantedVolumes: priming.wanted_volumes };
}

/** What the core is asked while somebody types; the server asks again, from its own figures, before anything is bottled. */
export function requestOf(form: BenchForm, facts: BenchFacts): BenchRequest {
  // Cold drink holds more gas: of two figures the colder one is the safe one.
  const warmest = Math.min(facts.warmest_since_end_c ?? Infinity, form.warmest_since_end_c ?? Infinity);
  return {
    volumeL: form.volume_l ?? facts.batch.volume_l,
    lossesL: form.losses_l,
    bottles: form.bottles.map((bottle) => ({ key: bottle.key, choice: { kind: bottle.kind, closure: bottle.closure, sizeMl: bottle.size_ml, confirmedBar: bottle.confirmed_bar }, atHand: bottle.at_hand })),
    drink: { abvPercent: Math.min(30, facts.for_gas.abv_percent), sugarGPerL: Math.min(400, facts.for_gas.sugar_g_per_l) },
    done: doneOf(facts.done),
    warmestSinceEndC: Math.min(40, Math.max(0, warmest)),
    cellarC: form.cellar_c,
    warmestStoreC: form.warmest_store_c,
    priming: corePriming(form.priming, form.bottles),
  };
}

/** The draft with a way out of a stop taken. */
export function takeWay(draft: BenchDraft, request: BenchRequest): BenchDraft {
  const { priming } = request;
  const bottles = request.bottles.map(({ key, choice, atHand }) => ({
    key,
    kind: choice.kind,
    closure: choice.closure,
    size: String(choice.sizeMl),
    confirmed: choice.confirmedBar === null ? '' : String(choice.confirmedBar),
    atHand: atHand === null ? '' : String(atHand),
    drops: priming.way === 'drops' ? String(priming.drops[key] ?? 0) : String(usualDrops(choice.sizeMl / 1000)),
  }));
  if (priming.way === 'none') return { ...draft, bottles, way: 'none' };
  if (priming.way === 'weighed') return { ...draft, bottles, volumes: priming.wantedVolumes };
  return { ...draft, bottles };
}
