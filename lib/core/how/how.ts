/** Every number on a screen can be asked "how?". This is the answer it carries. */
import type { Range } from '../units/range';

/**
 * How far a formula or a figure may be trusted: read in a published source or
 * computed from one; what the trade does, without a source; a rule of this
 * program; recalled and not checked; told or measured by the person.
 */
export const HOW_STATUSES = ['published', 'common practice', 'our own rule', 'from memory', 'told'] as const;
export type HowStatus = (typeof HOW_STATUSES)[number];

export interface Source {
  source: string;
  status: HowStatus;
}

export interface HowInput {
  name: string;
  value: number | string | null;
  unit: string;
}

/** How a figure came about. */
export interface How extends Source {
  formula: string;
  inputs: readonly HowInput[];
}

/** A number with its unit and its origin. Null where nothing honest can be said; `how` then says why. */
export interface Figure<T = number> {
  value: T;
  unit: string;
  how: How;
}

/** A number with the least and the most it may be. */
export type RangeFigure = Figure<Range>;

/** `['gravity', 1.050, 'SG']` for each input. */
export type InputTuple = readonly [name: string, value: number | string | null, unit: string];

export function how(formula: string, source: Source, inputs: readonly InputTuple[] = []): How {
  return { formula, source: source.source, status: source.status, inputs: inputs.map(([name, value, unit]) => ({ name, value, unit })) };
}

export function figure<T>(value: T, unit: string, origin: How): Figure<T> {
  return { value, unit, how: origin };
}

/** `1.050 (1.048 to 1.053)`, for the inputs of another figure. */
export function spell(range: Range, digits: number): string {
  const [lo, value, hi] = [range.lo.toFixed(digits), range.value.toFixed(digits), range.hi.toFixed(digits)];
  return lo === hi ? value : `${value} (${lo} to ${hi})`;
}
