/** The must sheet's shapes. */
import type { Figure, How, RangeFigure } from '../how/how';
import type { StrengthByMethod } from '../strength/methods';
import type { DrinkKind } from '../types';
import type { Range } from '../units/range';
import type { Allergen, MustLine, Yeast } from './ingredients';
import type { NeckForecast } from './neck';
import type { NitrogenSheet } from './nitrogen';

export interface MustSheet {
  name: string;
  kind: DrinkKind;
  lines: readonly MustLine[];
  yeast: Yeast | null;
  /** Water boiled away, L; for worts. */
  boiledAwayL: number;
  /** The vessel it ferments in, L; null: not chosen. */
  vesselL: number | null;
}

export const SWEETNESSES = ['dry', 'medium_dry', 'semi_sweet', 'sweet'] as const;
export type Sweetness = (typeof SWEETNESSES)[number];

/** Sugar that pieces give up over days. */
export interface Release {
  line: string;
  name: string;
  sugarG: number;
  overDays: Range;
}

export interface MustNote {
  kind: 'preservative' | 'sulphite' | 'allergen' | 'dose' | 'caution' | 'volume' | 'tolerance' | 'release' | 'diastatic';
  /** The line it is about; null for the whole. */
  line: string | null;
  sentence: string;
}

/** What a must sheet promises, each figure with its how. Null `figures` where nothing can be reckoned; `problems` says why. */
export interface MustOutcome {
  /** Liquid, by density, so displacement is in it, L. */
  volumeL: RangeFigure;
  /** Liquid and pulp: what has to fit the vessel, L. */
  fillL: RangeFigure;
  sugarG: RangeFigure;
  /** With all the sugar counted, released or not. */
  originalGravity: RangeFigure;
  /** At the pitch, before pieces have released theirs. */
  gravityAtPitch: RangeFigure;
  /** Part of the extract yeast can use, 0 to 1. */
  fermentableShare: RangeFigure;
  finalGravity: RangeFigure;
  strength: StrengthByMethod;
  /** Strength if everything fermentable went, whatever the yeast bears, % vol by Balling. */
  potential: StrengthByMethod;
  /** Sugar left when the yeast stops, g/L. */
  sugarLeftGPerL: RangeFigure;
  sweetness: { from: Sweetness; to: Sweetness; how: How };
  nitrogen: NitrogenSheet;
  neck: NeckForecast | null;
  releases: readonly Release[];
  sulphiteMgPerL: RangeFigure;
  allergens: readonly Allergen[];
  /** In the cellar's currency; `known` is false where a line has no cost. */
  cost: Figure<Range> & { known: boolean };
  notes: readonly MustNote[];
}

export interface MustProblem {
  /** The line it is about; null for the whole. */
  line: string | null;
  sentence: string;
}

export type MustResult = { ok: true; outcome: MustOutcome } | { ok: false; problems: readonly MustProblem[] };
