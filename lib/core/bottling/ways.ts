/** Ways out of a stop: each is a changed request, worked through again, with its own worst case. */
import { exactly, type Range } from '../units/range';
import { roundDown, roundTo } from '../units/rounding';
import { figure, how, type How } from '../how/how';
import { SOURCES } from '../how/sources';
import { VOLUMES_PER_POINT } from '../gas/gas';
import type { BenchBottle, BenchRequest, WayOut } from './bench';
import { BOTTLES, holds, type BottleKind, type Closure, type Rating } from './bottles';
import { volumesAtPressure } from './co2';
import type { DoneCheck } from './done';
import { primes, ratedBar, STILL_LIMIT_BAR, work, type Worked } from './judge';
import { READING_DOUBT_POINTS } from './remaining';

const lowestRating = (request: BenchRequest, filled: readonly { key: string }[]): number | 'never' => {
  const ratings = request.bottles.filter((b) => filled.some((f) => f.key === b.key)).map((b) => holds(b.choice).rating);
  const pressures = ratings.filter((r): r is Exclude<Rating, 'never'> => r !== 'never');
  return ratings.length > pressures.length || pressures.length === 0 ? 'never' : ratedBar(Math.min(...pressures));
};

/** How the worst case of a way out came about. */
export const howOfWay = (way: WayOut): How =>
  how('the bench worked through again with this change: gas as asked + 0.51 volumes for each point that may still ferment, in the warmest place, against the weakest of the bottles; a keg’s valve opens at its rating', SOURCES.ownRule, [
    ['at worst', way.worstBar, 'bar'],
    ['against', way.rated === 'never' ? 'still drink' : way.rated, way.rated === 'never' ? '' : 'bar'],
  ]);

/** Nothing is wrong but, at most, that nobody has read the maker's figure: the bench goes on asking for it. */
const onlyUnconfirmed = (tried: Worked): boolean => tried.problems.every((p) => p.kind === 'rating_not_confirmed');

/** A request is a way out when nothing is wrong with it, the figure to be confirmed aside. */
function offer(kind: WayOut['kind'], title: string, sentence: string, request: BenchRequest, use: boolean, tried: Worked = work(request)): WayOut[] {
  if (!onlyUnconfirmed(tried)) return [];
  const confirm = tried.problems.length > 0 ? ' Confirm the maker’s figure first.' : '';
  return [{ kind, title, sentence: `${sentence}${confirm}`, worstBar: tried.worstBar, rated: lowestRating(request, tried.picture.bottles), request: use ? request : null }];
}

/** The safe choices for a stopped request, those that need nothing but a change on the bench first. */
export function waysOut(request: BenchRequest, stopped: Worked): WayOut[] {
  return [
    ...confirmRating(request, stopped),
    ...lessSugar(request),
    ...bottleStill(request),
    ...otherBottles(request),
    ...wait(request),
    ...stabiliseStill(request),
    ...keg(request),
  ];
}

const still = (request: BenchRequest): BenchRequest => ({ ...request, priming: { way: 'none' } });

interface Less {
  kind: 'less_sugar' | 'fewer_drops';
  title: string;
  sentence: string;
  request: BenchRequest;
}

/** The same with less sugar, and less again: by a tenth of a volume, or a drop in each bottle. Under 1.2 volumes nobody tastes it. */
function* withLess(request: BenchRequest): Generator<Less> {
  const { priming } = request;
  if (priming.way === 'weighed') {
    const sentence = `Less sparkle than the ${priming.wantedVolumes.toFixed(1)} asked.`;
    for (let wanted = roundDown(priming.wantedVolumes - 0.1, 0.1); wanted >= 1.2; wanted = roundTo(wanted - 0.1, 0.1)) {
      yield { kind: 'less_sugar', title: `Prime to ${wanted.toFixed(1)} volumes`, sentence, request: { ...request, priming: { ...priming, wantedVolumes: wanted } } };
    }
  }
  if (priming.way === 'drops') {
    const most = Math.max(0, ...Object.values(priming.drops));
    for (let fewer = 1; fewer < most; fewer += 1) {
      const drops = Object.fromEntries(Object.entries(priming.drops).map(([key, n]) => [key, Math.max(0, n - fewer)]));
      yield { kind: 'fewer_drops', title: 'Fewer drops', sentence: `${fewer} less in each bottle.`, request: { ...request, priming: { ...priming, drops } } };
    }
  }
}

function lessSugar(request: BenchRequest): WayOut[] {
  for (const less of withLess(request)) {
    const tried = work(less.request);
    if (onlyUnconfirmed(tried)) return offer(less.kind, less.title, less.sentence, less.request, true, tried);
  }
  return [];
}

function bottleStill(request: BenchRequest): WayOut[] {
  if (!primes(request)) return [];
  return offer('bottle_still', 'Bottle it still', 'No sugar added. It may turn lightly fizzy by itself.', still(request), true);
}

/** Kinds of bottle, weakest first, with the closure that holds most and the highest figure a maker is likely to give, bar. */
const STRONGER: readonly { kind: BottleKind; closure: Closure; upTo: number }[] = [
  { kind: 'heavy_beer', closure: 'crown_26', upTo: 4 },
  { kind: 'pet', closure: 'pet_cap', upTo: 6 },
  { kind: 'sparkling_wine', closure: 'wired_stopper', upTo: 8 },
];

function otherBottles(request: BenchRequest): WayOut[] {
  return STRONGER.flatMap(({ kind, closure, upTo }) => {
    if (request.bottles.every((b) => b.choice.kind === kind)) return [];
    const entry = BOTTLES[kind];
    const choices: BenchBottle[] = entry.usualSizesMl
      .filter((ml) => ml <= 1000)
      .toSorted((a, b) => b - a)
      .map((sizeMl) => ({ key: `${kind}-${sizeMl}`, choice: { kind, closure, sizeMl, confirmedBar: upTo }, atHand: null }));
    // Drops were counted for other sizes: keep the grams in a litre.
    const first = request.bottles[0];
    const perL = request.priming.way === 'drops' && first ? (request.priming.drops[first.key] ?? 0) / first.choice.sizeMl : 0;
    const priming: BenchRequest['priming'] =
      request.priming.way === 'drops'
        ? { ...request.priming, drops: Object.fromEntries(choices.map((c) => [c.key, Math.floor(perL * c.choice.sizeMl + 1e-9)])) }
        : request.priming;
    const changed = { ...request, bottles: choices, priming };
    const tried = work(changed);
    // To use it, somebody has to confirm the maker's figure: the catalogue's is only usual.
    const unconfirmed = choices.map((c) => ({ ...c, choice: { ...c.choice, confirmedBar: null } }));
    const sentence = `Once its maker’s figure is confirmed at ${tried.worstBar.toFixed(1)} bar or more. ${entry.note}`;
    return offer('other_bottles', `Use a ${entry.name}`, sentence, changed, true, tried).map((way) => ({ ...way, request: { ...changed, bottles: unconfirmed } }));
  });
}

/** The same check as if the batch had finished, with so much that may still ferment. */
const finished = (done: DoneCheck, points: Range, stabilised: boolean): DoneCheck => ({
  ...done,
  verdict: 'done',
  stabilised,
  remaining: figure(points, 'points', how('what would be left then', SOURCES.ownRule)),
});

function wait(request: BenchRequest): WayOut[] {
  const { done } = request;
  if (done.gravity === null || !done.remaining) return [];
  const remaining = done.remaining.value.hi;
  if (done.verdict === 'done' && remaining <= READING_DOUBT_POINTS) return [];
  const asked = bearable(request);
  if (!asked) return [];
  const points = Math.min(asked.allowed, remaining);
  const target = roundDown(done.gravity - (remaining - points) / 1000, 0.001);
  const then: BenchRequest = { ...asked.request, done: finished(done, exactly(points), done.stabilised) };
  const [title, sentence] =
    target < done.gravity - 5e-4
      ? [`Let it fall to ${target.toFixed(3)} first`, 'Rouse the yeast, keep it warm, and wait for two equal readings there.']
      : ['Wait for equal readings', `${done.changesIt} Then judge again.`];
  return offer('wait', title, `${sentence}${asked.but}`, then, false);
}

/** What of the request bears at least the doubt of a reading once it has finished: all of it, or with less sugar, or still. */
function bearable(request: BenchRequest): { request: BenchRequest; allowed: number; but: string } | null {
  const asked = [{ request, but: '' }, ...[...withLess(request)].map((less) => ({ request: less.request, but: ` Then with less sugar: ${less.title.toLowerCase()}.` })), { request: still(request), but: ' Then still, without sugar.' }];
  for (const { request: one, but } of asked) {
    const allowed = allowedPoints(one);
    if (allowed >= READING_DOUBT_POINTS) return { request: one, allowed, but };
  }
  return null;
}

/** Points that every bottle asked for could bear on top of what is asked. */
function allowedPoints(request: BenchRequest): number {
  const { picture, abvAddedPercent } = work(request);
  const drink = { ...request.drink, abvPercent: Math.min(30, request.drink.abvPercent + abvAddedPercent) };
  const each = picture.bottles.map((p) => {
    const limit = p.holds.rating === 'never' ? STILL_LIMIT_BAR : ratedBar(p.holds.rating);
    return (volumesAtPressure(limit, request.warmestStoreC, drink) - p.volumes.value.hi) / VOLUMES_PER_POINT;
  });
  // A tenth of a point less, so that rounding the pressure up does not push it over.
  return roundDown(Math.min(100, ...each) - 0.1, 0.01);
}

function stabiliseStill(request: BenchRequest): WayOut[] {
  const { done } = request;
  // Stabilising does not stop a working yeast: only where the gravity stands still.
  if (done.stabilised || done.verdict === 'not_yet' || done.verdict === 'unknown') return [];
  const then: BenchRequest = { ...still(request), done: finished(done, exactly(0), true) };
  return offer('stabilise_still', 'Stabilise and bottle still', 'Rack bright, sulphite and sorbate in full dose, watch it a week, then bottle without sugar.', then, false);
}

function keg(request: BenchRequest): WayOut[] {
  if (request.bottles.every((b) => b.choice.kind === 'keg')) return [];
  const rating = BOTTLES.keg.rating;
  if (rating === 'never') return [];
  const { worstBar } = work(still(request));
  return [
    {
      kind: 'keg',
      title: 'Keg it',
      sentence: `In a keg whose relief valve works it vents instead of bursting. ${BOTTLES.keg.note}`,
      // The valve opens at the rating.
      worstBar: Math.min(worstBar, rating),
      rated: rating,
      request: null,
    },
  ];
}

function confirmRating(request: BenchRequest, stopped: Worked): WayOut[] {
  if (!stopped.problems.every((p) => p.kind === 'rating_not_confirmed')) return [];
  return [
    {
      kind: 'confirm_rating',
      title: 'Confirm the rating',
      sentence: 'Find the maker’s figure for these bottles and enter it. Without one they are not filled under pressure.',
      worstBar: stopped.worstBar,
      rated: lowestRating(request, stopped.picture.bottles),
      request: null,
    },
  ];
}
