/** Gas still in the drink when it is bottled. */
import { figure, how, type RangeFigure } from '../how/how';
import { SOURCES } from '../how/sources';
import { carrollSolubility, solubilityShare, vapourPressureAtm, volumesPerAtm, weissSolubility, type DrinkForGas } from './co2';

/**
 * Gas left, volumes: saturation under an atmosphere of CO2 at the warmest
 * temperature since the fermentation ended. The upper end is what pure water
 * holds, the lower and likely value what the drink holds with its alcohol and
 * sugar; so a dose reckoned from the upper end errs towards less pressure.
 * A drink that still works or was just moved may hold more; one long under a
 * loose cover, or stirred, less.
 *
 * @param warmestC warmest temperature since the end, °C, 0 to 40
 */
export function residualGas(warmestC: number, drink: DrinkForGas): RangeFigure {
  if (!(warmestC >= 0 && warmestC <= 40)) throw new RangeError('residual gas is reckoned from 0 to 40 °C');
  const gasAtm = 1 - vapourPressureAtm(warmestC);
  const [weiss, carroll] = [volumesPerAtm(weissSolubility(warmestC)), volumesPerAtm(carrollSolubility(warmestC))];
  const share = Math.min(1, solubilityShare(drink.abvPercent, drink.sugarGPerL));
  const low = Math.min(weiss, carroll) * share * gasAtm;
  return figure(
    { lo: low, value: low, hi: Math.max(weiss, carroll) * gasAtm },
    'volumes',
    how('saturation under 1 atm at the warmest temperature since the end: upper end in water, lower with alcohol and sugar', SOURCES.residual, [
      ['warmest since the end', warmestC, '°C'],
      ['strength', drink.abvPercent, '% vol'],
      ['sugar', drink.sugarGPerL, 'g/L'],
    ]),
  );
}
