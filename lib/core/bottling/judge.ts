/** The judgement of the bench: pressure in every bottle, three ways, against what it holds. */
import { figure, how, type RangeFigure } from '../how/how';
import { SOURCES } from '../how/sources';
import type { Range } from '../units/range';
import { roundDown, roundUp } from '../units/rounding';
import type { BenchBottle, BenchDose, BenchPicture, BenchRequest, BottlePicture, PressurePoint, Problem } from './bench';
import { BOTTLES, holds, PRESSURE_CAUTIONS, type Rating } from './bottles';
import { drinkPressure, type DrinkForGas } from './co2';
import { planBottles } from './plan';
import { abvFromPriming, doseFor, DROPS, gasFromSugar } from './priming';
import { gasFromPoints } from './remaining';
import { residualGas } from './residual';

/** Still drink stays under this at its warmest, bar: the law calls wine semi-sparkling from 1 bar at 20 °C (Regulation (EU) 1308/2013). */
export const STILL_LIMIT_BAR = 1;

/** Everything but the verdict: used by the verdict, by each way out and by the override. */
export interface Worked {
  picture: BenchPicture;
  problems: readonly Problem[];
  dose: BenchDose;
  abvAddedPercent: number;
  worstBar: number;
}

/** Sugar that goes into one bottle, g/L, with the doubt of what a drop weighs. */
function sugarGPerL(request: BenchRequest, bottle: BenchBottle, residualHi: number, litres: number): Range {
  const { priming } = request;
  switch (priming.way) {
    case 'none':
      return { lo: 0, value: 0, hi: 0 };
    case 'weighed': {
      const { gPerL } = doseFor(priming.wantedVolumes, residualHi, priming.sugar, litres);
      return { lo: gPerL, value: gPerL, hi: gPerL };
    }
    case 'drops': {
      const perL = (priming.drops[bottle.key] ?? 0) / (bottle.choice.sizeMl / 1000);
      return { lo: perL * priming.gramsEach.lo, value: perL * priming.gramsEach.value, hi: perL * priming.gramsEach.hi };
    }
  }
}

function pressurePoint(volumes: number, celsius: number, drink: DrinkForGas): PressurePoint {
  const { gaugeBar, how: origin } = drinkPressure(volumes, celsius, drink);
  return { bar: roundUp(Math.max(0, gaugeBar), 0.1), celsius, how: origin };
}

function pictureOf(request: BenchRequest, bottle: BenchBottle, count: number, residual: Range, remaining: RangeFigure, litres: number): BottlePicture & { abvAdded: number } {
  const sugar = request.priming.way === 'weighed' ? request.priming.sugar : DROPS;
  const gPerL = sugarGPerL(request, bottle, residual.hi, litres);
  const added = gasFromSugar(sugar, gPerL);
  const abvAdded = abvFromPriming(sugar, gPerL.hi);
  const asBottled = { ...request.drink, abvPercent: Math.min(30, request.drink.abvPercent + abvAdded) };
  const volumes = { lo: residual.lo + added.lo, value: residual.value + added.value, hi: residual.hi + added.hi };
  const more = gasFromPoints(remaining.value).value.hi;
  const worstVolumes = volumes.hi + more;
  return {
    key: bottle.key,
    choice: bottle.choice,
    holds: holds(bottle.choice),
    count,
    volumes: figure(
      volumes,
      'volumes',
      how('gas there already + gas from the sugar added', SOURCES.stoichiometry, [
        ['there already, at most', residual.hi, 'volumes'],
        ['from the sugar, at most', added.hi, 'volumes'],
      ]),
    ),
    worstVolumes: figure(
      roundUp(worstVolumes, 0.1),
      'volumes',
      how('gas as asked, upper end + 0.51 volumes for each point that may still ferment', SOURCES.pointsToVolumes, [
        ['as asked, at most', volumes.hi, 'volumes'],
        ['may still ferment, at most', remaining.value.hi, 'points'],
      ]),
    ),
    cellar: pressurePoint(volumes.hi, request.cellarC, asBottled),
    warm: pressurePoint(volumes.hi, request.warmestStoreC, asBottled),
    worst: pressurePoint(worstVolumes, request.warmestStoreC, asBottled),
    asBottled,
    abvAdded,
  };
}

/** All points between now and the end of a batch nobody has read are unknown: no remaining figure, no bench. */
const UNREAD: RangeFigure = figure({ lo: 0, value: 0, hi: 100 }, 'points', how('no hydrometer reading: all of it counts', SOURCES.ownRule));

/** Works a request through. Does not decide what is shown. */
export function work(request: BenchRequest): Worked {
  const residual = residualGas(request.warmestSinceEndC, request.drink);
  const remaining = request.done.remaining ?? UNREAD;
  const plan = planBottles(
    request.volumeL,
    request.lossesL,
    request.bottles.map(({ key, choice, atHand }) => ({ key, sizeMl: choice.sizeMl, atHand })),
  );
  const pictures = request.bottles.map((bottle) =>
    pictureOf(request, bottle, plan.filled.find((f) => f.key === bottle.key)?.count ?? 0, residual.value, remaining, plan.bottledL),
  );
  const filled = pictures.filter((p) => p.count > 0);
  const problems = [...batchProblems(request, filled), ...filled.flatMap((p) => bottleProblems(request, p))];
  const abvAddedPercent = Math.max(0, ...filled.map((p) => p.abvAdded));
  const worstBar = Math.max(0, ...filled.map((p) => p.worst.bar));
  return {
    picture: {
      plan,
      bottles: filled.map(({ abvAdded: _abvAdded, ...picture }) => picture),
      residual,
      remaining,
      cautions: worstBar > 0.5 ? PRESSURE_CAUTIONS : [],
    },
    problems,
    dose: doseOf(request, residual.value.hi, plan),
    abvAddedPercent,
    worstBar,
  };
}

function doseOf(request: BenchRequest, residualHi: number, plan: BenchPicture['plan']): BenchDose {
  const { priming } = request;
  switch (priming.way) {
    case 'none':
      return { way: 'none' };
    case 'weighed':
      return { way: 'weighed', sugar: priming.sugar, ...doseFor(priming.wantedVolumes, residualHi, priming.sugar, plan.bottledL) };
    case 'drops':
      return { way: 'drops', drops: priming.drops, totalDrops: plan.filled.reduce((sum, f) => sum + f.count * (priming.drops[f.key] ?? 0), 0) };
  }
}

/** Whether any sugar goes in. */
export function primes(request: BenchRequest): boolean {
  const { priming } = request;
  if (priming.way === 'drops') return Object.values(priming.drops).some((n) => n > 0);
  return priming.way === 'weighed' && priming.wantedVolumes > 0;
}

function batchProblems(request: BenchRequest, filled: readonly BottlePicture[]): Problem[] {
  const { done } = request;
  const problems: Problem[] = [];
  const say = (kind: Problem['kind'], sentence: string): void => void problems.push({ kind, bottle: null, sentence, overridable: kind !== 'nothing_to_fill' });
  if (filled.length === 0) say('nothing_to_fill', 'No bottle is filled: more volume, smaller bottles, or fewer losses.');
  // A keg vents: an unfinished drink may go into one, as long as nobody feeds it.
  const vents = filled.length > 0 && filled.every((p) => p.choice.kind === 'keg') && !primes(request);
  if (done.verdict === 'stopped_high' && !vents) say('stopped_high', done.reasons.at(-1) ?? 'It stopped high without a reason.');
  else if (done.verdict !== 'done' && !vents) say('not_done', `It is not known to be done. ${done.reasons[0] ?? ''}`.trim());
  if (done.stabilised && primes(request)) say('stabilised_and_primed', 'It is stabilised: sugar added now stays sweet, and works later if the stabilising fails.');
  return problems;
}

const bar = (value: number): string => value.toFixed(1);

function bottleProblems(request: BenchRequest, p: BottlePicture): Problem[] {
  const about = (kind: Problem['kind'], sentence: string, overridable = true): Problem => ({ kind, bottle: p.key, sentence, overridable });
  const name = BOTTLES[p.choice.kind].name;
  const at = `at ${p.worst.celsius} °C`;
  if (p.holds.rating === 'never') {
    if (primes(request)) return [about('never_under_pressure', `A ${name} with this closure never goes under pressure: no sugar.`, false)];
    if (p.worst.bar > STILL_LIMIT_BAR) {
      return [about('never_under_pressure', `A ${name} with this closure is for still drink. At worst this reaches ${bar(p.worst.bar)} bar ${at}; still is under ${bar(STILL_LIMIT_BAR)}.`, false)];
    }
    return [];
  }
  const rated = ratedBar(p.holds.rating);
  if (p.worst.bar <= Math.min(STILL_LIMIT_BAR, rated) && !primes(request)) return [];
  const problems: Problem[] = [];
  if (p.warm.bar > rated) problems.push(about('over_rating', `As asked a ${name} reaches ${bar(p.warm.bar)} bar ${at}. It is rated for ${bar(rated)}.`));
  else if (p.worst.bar > rated) {
    problems.push(about('over_rating_at_worst', `If the last sugar ferments, a ${name} ${at} reaches ${bar(p.worst.bar)} bar. It is rated for ${bar(rated)}.`));
  }
  if (!p.holds.confirmed) problems.push(about('rating_not_confirmed', `Nobody has confirmed what the ${name} is rated for. Read the maker’s figure; ${bar(rated)} bar is only usual.`));
  return problems;
}

/** A rating as it is compared and shown: down to 0.1 bar. */
export const ratedBar = (rating: Exclude<Rating, 'never'>): number => roundDown(rating, 0.1);
