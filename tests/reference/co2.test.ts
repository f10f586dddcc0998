import { describe, expect, test } from 'vitest';
import {
  carrollSolubility,
  drinkPressure,
  formerEuAbsoluteBarAt20,
  vapourPressureAtm,
  VOLUME_G_PER_L,
  volumesPerAtm,
  waterGaugeBar,
  weissSolubility,
} from '@/lib/core/bottling/co2';
import { residualGas } from '@/lib/core/bottling/residual';
import { num, publishedTable } from '../support/table';

describe('solubility of CO2 in water', () => {
  const rows = publishedTable('co2_solubility_water.csv');

  test.each(rows)('Weiss 1974 and Carroll 1991 at $t_C °C, to the digits of the table', (row) => {
    const t = num(row, 't_C');
    expect(weissSolubility(t)).toBeCloseTo(num(row, 'K0_weiss_mol_L'), 5);
    expect(carrollSolubility(t)).toBeCloseTo(num(row, 'K0_carroll_mol_L'), 4);
    expect(volumesPerAtm(weissSolubility(t))).toBeCloseTo(num(row, 'volumes_weiss'), 3);
    expect(volumesPerAtm(weissSolubility(t)) * (1 - vapourPressureAtm(t))).toBeCloseTo(num(row, 'volumes_weiss_total_1atm'), 3);
  });

  test('one volume is 44.0095 g in the 22.263 L that Weiss 1974 gives, between the 1.96 and 1.98 g/L in use', () => {
    expect(44.0095 / 22.263).toBeCloseTo(VOLUME_G_PER_L, 4);
  });

  test('cold water holds a tenth more than the two-constant Henry law (Sander 2015) says: the curved forms are used', () => {
    const cold = rows.find((row) => row.t_C === '0') ?? {};
    expect(volumesPerAtm(weissSolubility(0)) / num(cold, 'volumes_sander')).toBeGreaterThan(1.09);
  });
});

describe('pressure over water (Weiss 1974 with fugacity)', () => {
  test.each(publishedTable('co2_equilibrium_pressure_water.csv'))('$volumes volumes at $t_C °C, within 0.003 bar', (row) => {
    expect(Math.abs(waterGaugeBar(num(row, 'volumes'), num(row, 't_C')) - num(row, 'gauge_bar_real'))).toBeLessThan(0.003);
  });

  test('the same gas presses 1.89 times as hard at 25 °C as at 5 °C, and 1.31 times at 30 as at 20', () => {
    expect(weissSolubility(5) / weissSolubility(25)).toBeCloseTo(1.89, 2);
    expect(weissSolubility(20) / weissSolubility(30)).toBeCloseTo(1.31, 2);
  });
});

describe('pressure in the drink (Regulation (EEC) 2676/90, chapter 37)', () => {
  test.each(publishedTable('co2_pressure_wine_20C.csv'))('$volumes volumes at $abv_percent % vol and $sugar_g_per_L g/L, within 0.002 bar', (row) => {
    const absolute = formerEuAbsoluteBarAt20(num(row, 'volumes'), num(row, 'abv_percent'), num(row, 'sugar_g_per_L'));
    expect(Math.abs(absolute - num(row, 'p_abs_bar_20C'))).toBeLessThan(0.002);
  });

  test('water tables understate it: 16 % at 12 % vol, 25 % with 50 g/L of sugar besides', () => {
    const water = formerEuAbsoluteBarAt20(3, 0, 0);
    expect(formerEuAbsoluteBarAt20(3, 12, 0) / water).toBeCloseTo(1.16, 2);
    expect(formerEuAbsoluteBarAt20(3, 12, 50) / water).toBeCloseTo(1.25, 2);
  });

  test.each(publishedTable('co2_pressure_wine_20C.csv'))('the program never answers less than the table: $volumes volumes, $abv_percent % vol, $sugar_g_per_L g/L', (row) => {
    const { gaugeBar } = drinkPressure(num(row, 'volumes'), 20, { abvPercent: num(row, 'abv_percent'), sugarGPerL: num(row, 'sugar_g_per_L') });
    expect(gaugeBar).toBeGreaterThanOrEqual(num(row, 'p_gauge_bar_20C') - 0.001);
  });

  // Liger-Belair et al., Scientific Reports 7 (2017) 10938, Table 1: corked bottles of sparkling wine of about
  // 12.5 % vol; content 11 to 11.5 g/L (PMC8047704, Table 1). The pressures are read as absolute: as gauge
  // pressures they would need more gas than was measured.
  const measured = [[279, 4.7], [285, 5.8], [293, 7.5]] as const;

  test.each(measured)('a measured bottle of sparkling wine at %s K, %s bar, is not understated', (kelvin, bar) => {
    const { gaugeBar } = drinkPressure(11 / VOLUME_G_PER_L, kelvin - 273.15, { abvPercent: 12.5, sugarGPerL: 8 });
    expect(gaugeBar + 1.01325).toBeGreaterThan(bar);
    expect(gaugeBar + 1.01325).toBeLessThan(1.2 * bar);
  });

  test('it rises from 279 to 293 K as the measured bottle did, 1.60 times, within 5 %', () => {
    const at = (kelvin: number) => drinkPressure(5.6, kelvin - 273.15, { abvPercent: 12.5, sugarGPerL: 8 }).gaugeBar + 1.01325;
    expect(Math.abs(at(293) / at(279) / (7.5 / 4.7) - 1)).toBeLessThan(0.05);
  });
});

describe('gas left after the fermentation', () => {
  test('about 0.86 volumes at 20 °C, from 0.75 in a strong drink to what pure water holds', () => {
    const { value } = residualGas(20, { abvPercent: 12, sugarGPerL: 0 });
    expect(value.lo).toBeCloseTo(0.8504 * (0.74 / 0.86), 2);
    expect(value.hi).toBeCloseTo(0.8848 * (1 - 0.0231), 2);
  });
});
