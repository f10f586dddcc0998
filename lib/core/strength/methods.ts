/** The same two gravities by three methods, side by side, with why they differ. */
import { figure, how, spell, type Figure, type RangeFigure } from '../how/how';
import { SOURCES } from '../how/sources';
import type { Range } from '../units/range';
import { abvExcise, EXCISE_FACTORS } from './excise';
import { abvBalling, abvSimple } from './strength';

export interface ExciseRange extends Range {
  /** What the duty would be reckoned on: truncated to 0.1 % vol. */
  truncated: number;
}

export interface StrengthByMethod {
  simple: RangeFigure;
  /** Null where the excise publishes no factor. */
  excise: Figure<ExciseRange | null>;
  /** The one to show when only one is shown. */
  balling: RangeFigure;
  /** Widest spread of the three at the middle values, % vol. */
  difference: number;
  why: string;
}

const WHY =
  'The 131.25 rule is one straight line and runs low in strong drinks. The excise factors rise with the fall of gravity and were made for beer. ' +
  'Balling reckons with the mass of sugar, alcohol, gas and yeast. They part by 0.1 % vol at OG 1.045 and by 0.5 at 1.110.';

/** Error of Balling's relation itself, % vol: 0.2 up to 9 % vol, 0.5 at 14 (see abvBalling). */
export const ballingError = (abv: number): number => (abv <= 9 ? 0.2 : Math.min(0.8, 0.2 + (0.3 * (abv - 9)) / 5));

/** Spread of a function of the two gravities. */
export type Ends = (f: (originalGravity: number, finalGravity: number) => number) => Range;

/**
 * Strength, % vol, by three methods from an original and a final gravity with
 * their spreads, each measured apart. Never below 0.
 */
export function strengthByMethods(originalGravity: Range, finalGravity: Range): StrengthByMethod {
  return strengthByMethodsOf(originalGravity, finalGravity, (f) => ({
    lo: f(originalGravity.lo, finalGravity.hi),
    value: f(originalGravity.value, finalGravity.value),
    hi: f(originalGravity.hi, finalGravity.lo),
  }));
}

/** The same where the two gravities depend on each other: `ends` knows how. */
export function strengthByMethodsOf(originalGravity: Range, finalGravity: Range, ends: Ends): StrengthByMethod {
  const inputs = [
    ['original gravity', spell(originalGravity, 4), 'SG'],
    ['final gravity', spell(finalGravity, 4), 'SG'],
  ] as const;
  const simple = notNegative(ends(abvSimple));
  const plain = notNegative(ends(abvBalling));
  const balling = notNegative({ lo: plain.lo - ballingError(plain.lo), value: plain.value, hi: plain.hi + ballingError(plain.hi) });
  const middle = abvExcise(originalGravity.value, finalGravity.value);
  const excise = middle && { ...notNegative(ends(exciseHeld)), truncated: middle.truncated };
  const middles = [simple.value, plain.value, ...(excise ? [excise.value] : [])];
  return {
    simple: figure(simple, '% vol', how('(OG − FG) × 131.25', SOURCES.factor131, inputs)),
    excise: figure(
      excise,
      '% vol',
      how(excise ? '(OG − FG) in points × factor of the table, truncated to 0.1' : 'no factor is published for this fall of gravity', SOURCES.excise, inputs),
    ),
    balling: figure(
      balling,
      '% vol',
      how('A = (OE − RE)/(2.0665 − 0.010665 OE), RE = 0.1808 OE + 0.8192 AE in °P; A × FG/0.7907. The method’s own error, 0.2 to 0.8 % vol, is in the spread', SOURCES.balling, inputs),
    ),
    difference: Math.max(...middles) - Math.min(...middles),
    why: WHY,
  };
}

const notNegative = ({ lo, value, hi }: Range): Range => ({ lo: Math.max(0, lo), value: Math.max(0, value), hi: Math.max(0, hi) });

/** For the ends of a spread alone: past the end of the table its last factor is held. */
function exciseHeld(originalGravity: number, gravity: number): number {
  const last = EXCISE_FACTORS.at(-1)?.factor ?? 0;
  return abvExcise(originalGravity, gravity)?.full ?? Math.max(0, (originalGravity - gravity) * 1000 * last);
}
