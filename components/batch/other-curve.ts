import type { Laid } from '@/components/charts/picture';
import { type Beside, type OtherCurve } from '@/lib/core/fit/other';
import type { NoFit } from '@/lib/core/fit/models';
import type { Footing } from '@/lib/core/types';
import { gravityText } from './figures';

export const CURVE_NAMES: Record<OtherCurve, string> = { logistic: 'Logistic, 4 parameters', gompertz: 'Gompertz, modified', richards: 'Richards' };
const SHORT: Record<OtherCurve, string> = { logistic: 'logistic', gompertz: 'Gompertz', richards: 'Richards' };

/** Difference in AIC from which on one curve is clearly the better (Burnham and Anderson 2002: 4 to 7 considerably less support, over 10 hardly any). */
const CLEAR = 4;
const HARDLY = 10;
const POINTS = 160;

const within = (points: number) => `${points.toFixed(1)} points`;
const end = (points: number, half: number | null) => `${gravityText(1 + points / 1000)}${half === null ? '' : ` ± ${Math.max(0.001, half / 1000).toFixed(3)}`}`;

function supportWords(aicMore: number | null): string {
  if (aicMore === null) return 'Too few readings to weigh the two by AIC.';
  const by = Math.abs(aicMore).toFixed(0);
  if (aicMore > HARDLY) return `AIC ${by} higher: hardly any support beside the curve in use.`;
  if (aicMore > CLEAR) return `AIC ${by} higher: considerably less support than the curve in use.`;
  if (aicMore >= -CLEAR) return `AIC within ${Math.max(1, Math.ceil(Math.abs(aicMore)))}: on these readings neither is the better. The curve in use also knows the temperature and the yeast.`;
  return `AIC ${by} lower: nearer to these readings. The curve in use is kept because it also knows the temperature and the yeast, which say more of what is to come.`;
}

/** Why it was not chosen, with the figures: what it leaves unexplained, where it would end, how it is supported. */
export function curveWords(name: OtherCurve, beside: Beside | NoFit): string {
  if (!('rms' in beside)) return `${CURVE_NAMES[name]} cannot be fitted here: ${beside.why}.`;
  const { rms, end: ends, readings, aicMore } = beside;
  const other = ends.otherHalf === null ? `It would end at ${end(ends.other, null)}, which the readings do not determine` : `It would end at ${end(ends.other, ends.otherHalf)}`;
  return `${CURVE_NAMES[name]}: ${within(rms.other)} off on ${readings} readings, the curve in use ${within(rms.own)}. ${other}; the curve in use at ${end(ends.own, ends.ownHalf)}. ${supportWords(aicMore)}`;
}

/** The curve as it is drawn, from its first reading to the end of the forecast; seconds since 1970. */
export function curveLaid(name: OtherCurve, beside: Beside | NoFit, footing: Footing, until: number): Laid | null {
  if (!('rms' in beside)) return null;
  const from = footing.at / 1000 - (footing.hour - (footing.data.hours[0] ?? footing.hour)) * 3600;
  const points = Array.from({ length: POINTS }, (_, i) => {
    const at = from + (i / (POINTS - 1)) * (until - from);
    return { at, gravity: 1 + beside.gravity(at * 1000) / 1000 };
  });
  return { points, words: SHORT[name], end: null };
}

