/** The bench's shapes: what is asked, and the three answers. A stop has no dose in its type. */
import type { Figure, How, RangeFigure } from '../how/how';
import type { Range } from '../units/range';
import type { DoneCheck } from './done';
import type { DrinkForGas } from './co2';
import type { BottleChoice, Holds } from './bottles';
import type { BottlePlan } from './plan';
import type { Dose, PrimingSugar } from './priming';

/** How the sugar goes in: reckoned for a wanted sparkle, or so many drops a bottle. */
export type Priming =
  | { way: 'none' }
  | { way: 'weighed'; sugar: PrimingSugar; wantedVolumes: number }
  | { way: 'drops'; gramsEach: Range; /** Drops in a bottle, by its key. */ drops: Readonly<Record<string, number>> };

export interface BenchBottle {
  key: string;
  choice: BottleChoice;
  /** As many as are at hand; null: enough. */
  atHand: number | null;
}

export interface BenchRequest {
  volumeL: number;
  lossesL: number;
  bottles: readonly BenchBottle[];
  /** Strength at its upper end and sugar at its upper end, for the pressure. */
  drink: DrinkForGas;
  done: DoneCheck;
  /** Warmest since the fermentation ended, °C. */
  warmestSinceEndC: number;
  cellarC: number;
  /** Warmest place the bottles will ever stand, °C. */
  warmestStoreC: number;
  priming: Priming;
}

export interface PressurePoint {
  /** Upper end, bar gauge, rounded up to 0.1. */
  bar: number;
  celsius: number;
  how: How;
}

/** What one bottle will hold, three ways. */
export interface BottlePicture {
  key: string;
  choice: BottleChoice;
  holds: Holds;
  count: number;
  /** Gas as asked: what is there and what the sugar gives. */
  volumes: RangeFigure;
  /** Gas if all the sugar left ferments too. */
  worstVolumes: Figure;
  cellar: PressurePoint;
  warm: PressurePoint;
  /** At the warmest place, all the sugar left fermented. */
  worst: PressurePoint;
  /** The drink that its pressures are reckoned for: a little stronger than in the vessel, by the sugar for fizz. */
  asBottled: DrinkForGas;
}

export const PROBLEM_KINDS = ['not_done', 'stopped_high', 'never_under_pressure', 'over_rating', 'over_rating_at_worst', 'rating_not_confirmed', 'stabilised_and_primed', 'nothing_to_fill'] as const;
export type ProblemKind = (typeof PROBLEM_KINDS)[number];

export interface Problem {
  kind: ProblemKind;
  /** Key of the bottle it is about; null for the batch. */
  bottle: string | null;
  sentence: string;
  /** Whether a brewer's written reason may override it. Still-wine glass under pressure: never. */
  overridable: boolean;
}

export const WAY_KINDS = ['wait', 'stabilise_still', 'less_sugar', 'fewer_drops', 'bottle_still', 'other_bottles', 'keg', 'confirm_rating'] as const;
export type WayKind = (typeof WAY_KINDS)[number];

/** A way out of a stop, with its own worst case. */
export interface WayOut {
  kind: WayKind;
  title: string;
  sentence: string;
  /** Its own worst case, bar gauge at the warmest place, rounded up. */
  worstBar: number;
  /** What it is held against, bar; `never` for glass that must stay still. */
  rated: number | 'never';
  /** The changed request, where the bench can simply use it; null where the person has to do something first. */
  request: BenchRequest | null;
}

export interface BenchPicture {
  plan: BottlePlan;
  bottles: readonly BottlePicture[];
  /** Gas already there. */
  residual: RangeFigure;
  /** Points that may still ferment. */
  remaining: RangeFigure;
  cautions: readonly string[];
}

/** Sugar to weigh, or drops to count. */
export type BenchDose = { way: 'none' } | ({ way: 'weighed'; sugar: PrimingSugar } & Dose) | { way: 'drops'; drops: Readonly<Record<string, number>>; totalDrops: number };

export interface BenchSafe extends BenchPicture {
  verdict: 'safe';
  headline: string;
  sentence: string;
  dose: BenchDose;
  abvAddedPercent: number;
}

export interface BenchStop extends BenchPicture {
  verdict: 'stop';
  headline: string;
  sentence: string;
  problems: readonly Problem[];
  ways: readonly WayOut[];
}

/** A stop that a brewer put aside in writing. It keeps its problems and its worst case for good. */
export interface BenchOverridden extends BenchPicture {
  verdict: 'overridden';
  headline: string;
  problems: readonly Problem[];
  reason: string;
  by: string;
  at: number;
  /** Highest worst case of all bottles, bar gauge. */
  worstBar: number;
  dose: BenchDose;
  abvAddedPercent: number;
}

export type BenchVerdict = BenchSafe | BenchStop;
