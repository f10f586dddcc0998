import { dayRange, when } from '@/components/charts/zone';
import type { Laid } from '@/components/charts/picture';
import type { BatchBody } from '@/lib/contracts/batches';
import type { Footing } from '@/lib/core/types';
import { whatIf, type WhatIf, type WhatIfOutcome } from '@/lib/core/what-if';
import { degrees, grams, gravityText, litres, percent, typedGravity, typedNumber } from './figures';

/** What is played with, as it is typed. */
export interface WhatIfDraft {
  gravity: string;
  temperature: string;
  sugar: string;
  volume: string;
  liquidGravity: string;
}

export const NOTHING_ELSE: WhatIfDraft = { gravity: '', temperature: '', sugar: '', volume: '', liquidGravity: '' };

export const isTouched = (draft: WhatIfDraft): boolean => Object.values(draft).some((text) => text.trim() !== '');

export interface WhatIfRow {
  name: string;
  judged: string;
  otherwise: string;
  /** The two say the same. */
  same: boolean;
}

export type WhatIfErrors = Partial<Record<keyof WhatIfDraft, string>>;

export interface Played {
  errors: WhatIfErrors;
  /** What stands beside each other; null while nothing was asked or it cannot be told. */
  rows: WhatIfRow[];
  cautions: string[];
  laid: Laid | null;
}

type Batch = Pick<BatchBody, 'kind' | 'volume_l' | 'vessel_l' | 'alcohol_tolerance_abv' | 'temperature_min_c' | 'temperature_max_c' | 'neck'>;

const vesselOf = (batch: Batch) => ({ kind: batch.kind, volumeL: batch.volume_l, vesselL: batch.vessel_l, alcoholToleranceAbv: batch.alcohol_tolerance_abv });

/** Sugar to a vessel that no yeast could work through, g/L. */
const MOST_SUGAR_G_PER_L = 400;

function read(draft: WhatIfDraft, batch: Batch, footing: Footing): { change: WhatIf; errors: WhatIfErrors } {
  const errors: WhatIfErrors = {};
  const span = (field: keyof WhatIfDraft, value: number | null, min: number, max: number, says: string): number | undefined => {
    if (value === null) return undefined;
    if (value >= min && value <= max) return value;
    errors[field] = says;
    return undefined;
  };
  const top = 1 + footing.level / 1000;
  const finalGravity = span('gravity', typedGravity(draft.gravity), 0.98, top, `0.980 to ${top.toFixed(3)}, what it stands at now`);
  const temperatureC = span('temperature', typedNumber(draft.temperature), 4, 34, '4 to 34 °C');
  const mostSugar = Math.round(MOST_SUGAR_G_PER_L * batch.volume_l);
  const sugarG = span('sugar', typedNumber(draft.sugar), 0, mostSugar, `0 to ${grams(mostSugar)}`);
  const room = batch.vessel_l - batch.volume_l;
  const volumeL = span('volume', typedNumber(draft.volume), 0, room, room > 0 ? `the vessel has room for ${Number(room.toFixed(2))} L` : 'the vessel is full');
  const gravity = span('liquidGravity', typedGravity(draft.liquidGravity), 0.99, 1.5, '0.990 to 1.500');
  if (volumeL !== undefined && gravity === undefined && !errors.liquidGravity && volumeL > 0) errors.liquidGravity = 'tell its gravity';
  if (sugarG && volumeL) errors.sugar = 'one or the other: sugar, or a liquid';
  return { change: { finalGravity, temperatureC, sugarG, liquid: volumeL !== undefined && gravity !== undefined ? { volumeL, gravity } : undefined }, errors };
}

function endWords(outcome: WhatIfOutcome, footing: Footing, timeZone: string): string {
  if (outcome.end) return dayRange(outcome.end.lo / 1000, outcome.end.hi / 1000, timeZone);
  return footing.state === 'terminal' ? 'reached' : 'not known';
}

function rowsOf(as: WhatIfOutcome, other: WhatIfOutcome, footing: Footing, now: number, timeZone: string): WhatIfRow[] {
  const neck = ({ neck: { tubeUntil } }: WhatIfOutcome) => (tubeUntil === null ? 'an airlock will do' : `tube until ${when(tubeUntil / 1000, now, timeZone)}`);
  const gas = (outcome: WhatIfOutcome) => `${outcome.gas.value.toFixed(2)} L/h`;
  const stalled = footing.state === 'stuck';
  const row = (name: string, judged: string, otherwise: string): WhatIfRow => ({ name, judged, otherwise, same: judged === otherwise });
  return [
    ...(other.volumeL === as.volumeL ? [] : [row('in the vessel', litres(as.volumeL), litres(other.volumeL)), row('gravity, stirred in', gravityText(as.gravity), gravityText(other.gravity))]),
    row('stops at', gravityText(as.finalGravity), gravityText(other.finalGravity)),
    row('likely end', stalled ? 'stalled' : endWords(as, footing, timeZone), endWords(other, footing, timeZone)),
    row('strength then', percent(as.abvPercent), percent(other.abvPercent)),
    row('most gas from now', stalled ? 'stalled' : gas(as), gas(other)),
    row('neck', stalled ? 'stalled' : neck(as), neck(other)),
  ];
}

function cautionsOf(change: WhatIf, other: WhatIfOutcome, batch: Batch, footing: Footing): string[] {
  const { temperatureC: warm } = change;
  const { temperature_min_c: min, temperature_max_c: max } = batch;
  return [
    footing.state === 'stuck' ? 'It stalls now: this holds only if it takes up again.' : null,
    warm !== undefined && min !== null && warm < min ? `Under ${degrees(min)}, the least this yeast wants: it may stop before the end.` : null,
    warm !== undefined && max !== null && warm > max ? `Over ${degrees(max)}, the most this yeast wants: expect harsher smells and tastes.` : null,
    batch.neck !== 'blow_off' && batch.neck !== 'open' && other.gas.value > 1.3 * other.neck.limit ? `Gas over ${other.neck.limit.toFixed(2)} L/h: foam may reach the airlock. Put the tube on first.` : null,
    (change.sugarG || change.liquid) && footing.level < footing.effectiveOg - 5 ? 'A drink full of gas foams over when sugar goes in: add it slowly, leave room.' : null,
    other.toleranceReached ? 'The yeast bears no more alcohol than that: sugar is left, and it may ferment later. Not for bottles that hold pressure.' : null,
  ].filter((text) => text !== null);
}

/** What would be otherwise beside what is judged. `now` in seconds since 1970. Nothing of it is kept. */
export function play(draft: WhatIfDraft, batch: Batch, footing: Footing, now: number, timeZone: string): Played {
  const { change, errors } = read(draft, batch, footing);
  const nothing: Played = { errors, rows: [], cautions: [], laid: null };
  if (!isTouched(draft) || Object.keys(errors).length > 0) return nothing;
  const as = whatIf(footing, vesselOf(batch));
  const other = whatIf(footing, vesselOf(batch), change);
  if (!as) return nothing;
  if (!other) return { ...nothing, errors: { [change.sugarG ? 'sugar' : change.liquid ? 'volume' : 'gravity']: 'the vessel cannot hold it, or the curve cannot end there' } };
  return {
    errors,
    rows: rowsOf(as, other, footing, now, timeZone),
    cautions: cautionsOf(change, other, batch, footing),
    laid: {
      points: other.curve.map(({ at, gravity }) => ({ at: at / 1000, gravity })),
      words: 'what if, not real',
      end: other.end && other.end.hi / 1000 > now ? { lo: other.end.lo / 1000, hi: other.end.hi / 1000, gravity: other.finalGravity } : null,
    },
  };
}
