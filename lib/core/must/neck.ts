/** Before the pitch: will this must in this vessel need a blow-off tube? */
import { figure, how, spell, type How, type RangeFigure } from '../how/how';
import { SOURCES } from '../how/sources';
import { gasLPerH, swapGasLPerH } from '../gas/gas';
import type { DrinkKind } from '../types';
import { mapRange, type Range } from '../units/range';

/** Highest daily fall as a share of the whole drop: our own, from the middle and the upper end of the fermentation curve's starting values. */
const PEAK_SHARE_PER_DAY: Record<DrinkKind, Range> = {
  beer: { lo: 0.25, value: 0.35, hi: 0.6 },
  cider: { lo: 0.1, value: 0.2, hi: 0.4 },
  mead: { lo: 0.06, value: 0.15, hi: 0.35 },
  wine: { lo: 0.15, value: 0.25, hi: 0.45 },
};

/** Below this share of the vessel free, it is full to the neck. Our own rule. */
const FULL_TO_THE_NECK = 0.1;

export interface NeckForecast {
  headspaceL: RangeFigure;
  /** Gas at the height of the ferment, L/h. */
  peakGasLPerH: RangeFigure;
  /** Gas an airlock may take, L/h. */
  airlockBearsLPerH: number;
  fits: boolean;
  startOn: 'blow_off' | 'airlock';
  foam: 'low' | 'some' | 'high';
  sentence: string;
  how: How;
}

/**
 * Headspace, the gas to expect at the peak, and what to close the neck with. The
 * peak is known to a factor of two before the pitch, so the upper end decides.
 *
 * @param fillL liquid and pulp, L
 * @param dropPoints fall expected from the pitch to the end, points
 */
export function neckForecast(kind: DrinkKind, fillL: Range, vesselL: number, dropPoints: Range): NeckForecast {
  const share = PEAK_SHARE_PER_DAY[kind];
  const gas: Range = {
    lo: gasLPerH(dropPoints.lo * share.lo, fillL.lo),
    value: gasLPerH(dropPoints.value * share.value, fillL.value),
    hi: gasLPerH(dropPoints.hi * share.hi, fillL.hi),
  };
  const headspace = mapRange(fillL, (l) => vesselL - l);
  const bears = swapGasLPerH(kind, fillL.value, vesselL);
  const full = headspace.value < FULL_TO_THE_NECK * vesselL;
  const fits = headspace.lo >= 0;
  const tube = full || gas.hi > bears;
  const foam = full || gas.value > bears ? 'high' : gas.hi > bears ? 'some' : 'low';
  const origin = how('0.55 × litres × highest fall a day ÷ 24; an airlock bears half the headspace ÷ foaminess, at most 2 L/h', SOURCES.foam, [
    ['fill', spell(fillL, 1), 'L'],
    ['vessel', vesselL, 'L'],
    ['fall expected', spell(dropPoints, 0), 'points'],
    ['highest fall a day', `${Math.round(100 * share.lo)} to ${Math.round(100 * share.hi)} %`, 'of it'],
  ]);
  return {
    headspaceL: figure(headspace, 'L', how('vessel − liquid and pulp', SOURCES.icumsa, [['vessel', vesselL, 'L'], ['fill', spell(fillL, 1), 'L']])),
    peakGasLPerH: figure(gas, 'L/h', origin),
    airlockBearsLPerH: bears,
    fits,
    startOn: tube ? 'blow_off' : 'airlock',
    foam,
    sentence: sentenceOf(fits, full, tube, headspace, gas, bears),
    how: origin,
  };
}

function sentenceOf(fits: boolean, full: boolean, tube: boolean, headspace: Range, gas: Range, bears: number): string {
  if (!fits) return headspace.hi < 0 ? `It does not fit: ${(-headspace.value).toFixed(1)} L too much.` : 'It may not fit: leave some out, or take a larger vessel.';
  if (full) return `Full to the neck, ${headspace.value.toFixed(1)} L free: start on a blow-off tube.`;
  if (tube) return `Start on a blow-off tube: gas may reach ${gas.hi.toFixed(1)} L/h; an airlock here bears ${bears.toFixed(1)}.`;
  return `An airlock will do: gas stays under ${gas.hi.toFixed(1)} L/h with ${headspace.value.toFixed(1)} L free.`;
}
