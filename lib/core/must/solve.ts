/** Scaling a sheet, and working back from what is wanted to the amount of one line. */
import { abvBalling } from '../strength/strength';
import { times } from '../units/range';
import { problemsOf } from './outcome';
import type { MustSheet } from './sheet';
import { inputsOfSheet, stateAt, type MustState } from './state';

/** The must at the middle of its ranges; null where it cannot be reckoned. */
function middleOf(sheet: MustSheet): MustState | null {
  return problemsOf(sheet).length > 0 ? null : stateAt(sheet, inputsOfSheet(sheet).map((r) => r.value));
}

/** The same must, more or less of it: every amount and the water boiled away times a factor. */
export function scaleSheet(sheet: MustSheet, factor: number): MustSheet {
  if (!(factor > 0 && Number.isFinite(factor))) throw new RangeError('a must is scaled by a number above 0');
  return {
    ...sheet,
    boiledAwayL: sheet.boiledAwayL * factor,
    lines: sheet.lines.map((line) => ({ ...line, amount: { ...line.amount, quantity: times(line.amount.quantity, factor) } })),
  };
}

/**
 * A sheet scaled so that it fills so much of another vessel, L of liquid and
 * pulp. Null where the sheet cannot be reckoned.
 */
export function scaleToFill(sheet: MustSheet, fillL: number, vesselL: number | null = sheet.vesselL): MustSheet | null {
  const middle = middleOf(sheet);
  if (!middle || !(fillL > 0)) return null;
  return { ...scaleSheet(sheet, fillL / (middle.volumeL + middle.pulpL)), vesselL };
}

/** What is wanted of the must: its original gravity, SG, or its strength by Balling, % vol. */
export type Wanted = { original: number } | { abvPercent: number };

export type Solved = { ok: true; sheet: MustSheet; factor: number } | { ok: false; sentence: string };

/** A line may grow this many times. */
const MOST_TIMES = 200;

/**
 * Changes the amount of one line until the must has the gravity or strength
 * wanted; all else stays. Bisection on the amount, to 1e-6 of it. Says so where
 * no amount of that line does it.
 */
export function amountFor(sheet: MustSheet, lineId: string, wanted: Wanted): Solved {
  const line = sheet.lines.find((l) => l.id === lineId);
  if (!line || !(line.amount.quantity.value > 0)) return { ok: false, sentence: 'Give the line an amount to start from.' };
  const target = 'original' in wanted ? wanted.original : wanted.abvPercent;
  const at = (factor: number): number | null => {
    const middle = middleOf(withAmount(sheet, lineId, factor));
    return middle && reached(middle, wanted);
  };
  const [least, most] = reckonable(at);
  if (!least || !most) return { ok: false, sentence: 'The rest of the must cannot be reckoned.' };
  const rising = most.value > least.value;
  const [low, high] = rising ? [least.value, most.value] : [most.value, least.value];
  if (target < low || target > high) {
    return { ok: false, sentence: `With ${line.ingredient.name} alone it comes between ${shown(low, wanted)} and ${shown(high, wanted)}.` };
  }
  let [lo, hi] = [least.factor, most.factor];
  for (let i = 0; i < 60 && hi - lo > 1e-6 * hi; i += 1) {
    const mid = (lo + hi) / 2;
    const value = at(mid);
    if (value !== null && (value < target) === rising) lo = mid;
    else hi = mid;
  }
  return { ok: true, sheet: withAmount(sheet, lineId, hi), factor: hi };
}

interface Tried {
  factor: number;
  value: number;
}

/** Least and most, of none and a doubling row of factors, at which the must makes sense: some water, and not over 45 °Bx. */
function reckonable(at: (factor: number) => number | null): [Tried | null, Tried | null] {
  let [least, most]: [Tried | null, Tried | null] = [null, null];
  for (let factor = 0; factor <= MOST_TIMES; factor = factor === 0 ? 1 / 64 : factor * 1.5) {
    const value = at(factor);
    if (value === null && most) break;
    if (value === null) continue;
    least ??= { factor, value };
    most = { factor, value };
  }
  return [least, most];
}

function withAmount(sheet: MustSheet, lineId: string, factor: number): MustSheet {
  return {
    ...sheet,
    lines: sheet.lines.map((l) => (l.id === lineId ? { ...l, amount: { ...l.amount, quantity: times(l.amount.quantity, factor) } } : l)),
  };
}

const reached = (state: MustState, wanted: Wanted): number =>
  'original' in wanted ? state.originalGravity : abvBalling(state.originalGravity, state.finalGravity);

const shown = (value: number, wanted: Wanted): string => ('original' in wanted ? value.toFixed(3) : `${value.toFixed(1)} % vol`);
