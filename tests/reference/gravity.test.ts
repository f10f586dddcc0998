import { describe, expect, it } from 'vitest';
import { sucroseDensity, sucroseFractionOf, waterDensity } from '../../lib/core/gravity/density';
import { extractGPerL, gravityAfterSugar, gravityOfBlend, POINTS_PER_G_PER_L } from '../../lib/core/gravity/extract';
import { correctHydrometer } from '../../lib/core/gravity/hydrometer';
import { brixOf, platoOf, sgOfPlato } from '../../lib/core/gravity/plato';
import { abvBalling, abvSimple, apparentAttenuation, pointsAtTolerance, realExtract } from '../../lib/core/strength/strength';
import { table } from './tables';

describe('density', () => {
  it('of water is that of Tanaka et al., Metrologia 38 (2001) 301–309', () => {
    for (const row of table('density_water.csv')) expect(waterDensity(row.t_C!)).toBeCloseTo(row.rho_tanaka!, 3);
  });

  it('of sucrose solutions is that of ICUMSA SPS-4 (1998), as computed from its printed coefficients', () => {
    for (const row of table('density_sucrose_20C.csv')) {
      expect(sucroseDensity(row.mass_percent! / 100, 20)).toBeCloseTo(row.rho20_icumsa_kg_m3!, 2);
      expect(sucroseFractionOf(row.rho20_icumsa_kg_m3!, 20)).toBeCloseTo(row.mass_percent! / 100, 5);
    }
  });
});

describe('degrees Plato and Brix', () => {
  it('follow NBS Circular C440 (1942), Table 114, within 0.005 °P to 22 % and 0.005 °Bx to 29 %', () => {
    const rows = table('density_sucrose_20C.csv').filter((row) => Number.isFinite(row.sg2020_nbs_c440_in_air!));
    expect(rows.length).toBeGreaterThan(25);
    for (const row of rows) {
      if (row.mass_percent! <= 22) expect(Math.abs(platoOf(row.sg2020_nbs_c440_in_air!) - row.mass_percent!)).toBeLessThan(0.005);
      expect(Math.abs(brixOf(row.sg2020_nbs_c440_in_air!) - row.mass_percent!)).toBeLessThan(0.005);
    }
  });

  it('are nought for water: the misprint 1114.14 of the ASBC polynomial would give 3 °P', () => {
    expect(Math.abs(platoOf(1))).toBeLessThan(0.01);
    expect(Math.abs(brixOf(1))).toBeLessThan(0.01);
  });

  it('come back from the gravity they were turned into', () => {
    for (let plato = -3; plato <= 32; plato += 0.5) expect(platoOf(sgOfPlato(plato))).toBeCloseTo(plato, 9);
  });
});

describe('extract', () => {
  it('grows by 2.58 g in 100 mL a point of 0.010, as in the table of the Kaiserliches Gesundheitsamt (1894, 15 °C)', () => {
    for (const row of table('extract_from_sg_wine_1894.csv')) {
      if (row.relative_density! < 1.001) continue;
      expect(Math.abs(extractGPerL(row.relative_density!) / 10 - row.extract_g_per_100cm3!)).toBeLessThan(0.03);
    }
  });

  it('brings 0.3865 points a g/L within 1.5 % of the sucrose table between 1.010 and 1.100', () => {
    for (const row of table('density_sucrose_20C.csv')) {
      if (row.mass_percent! < 3 || row.mass_percent! > 24) continue;
      const points = 1000 * (row.sg2020_icumsa_vacuum! - 1);
      expect(Math.abs(points / row.sucrose_g_per_L! / POINTS_PER_G_PER_L - 1)).toBeLessThan(0.015);
    }
  });

  it('adds up when sugar or another liquid goes in', () => {
    expect(gravityAfterSugar(1.05, 10, 1000)).toBeCloseTo(1.05 + 0.03865, 6);
    expect(gravityOfBlend(1.06, 4, 1, 1)).toBeCloseTo(1.048, 9);
  });
});

describe('the hydrometer correction', () => {
  it('is the physics of ISO 1768 glass in a sucrose solution, hydrometer graduated at 20 °C', () => {
    const rows = table('hydrometer_temperature_correction_sg.csv').filter((row) => row.calibration_C === 20);
    expect(rows.length).toBeGreaterThan(40);
    for (const row of rows) {
      expect(Math.abs(correctHydrometer(row.reading!, row.sample_C!) - row.sg_at_calibration_temperature!)).toBeLessThan(2e-5);
    }
  });

  it('is the same for one graduated at 15.56, 15 or 17.5 °C: what it shows warm or cold and what the table says it would show at its own temperature are one liquid', () => {
    const rows = table('hydrometer_temperature_correction_sg.csv').filter((row) => row.calibration_C !== 20);
    expect(rows.filter((row) => row.calibration_C === 15.56).length).toBeGreaterThan(40);
    for (const row of rows) {
      const asRead = correctHydrometer(row.reading!, row.sample_C!, row.calibration_C!);
      const atItsOwn = correctHydrometer(row.sg_at_calibration_temperature!, row.calibration_C!, row.calibration_C!);
      expect(Math.abs(asRead - atItsOwn), `${row.calibration_C} ${row.reading} ${row.sample_C}`).toBeLessThan(2e-5);
    }
  });

  it('changes nothing at the temperature it is graduated for', () => {
    expect(correctHydrometer(1.05, 20)).toBeCloseTo(1.05, 9);
  });

  it('goes up in a warm sample and down in a cold one', () => {
    expect(correctHydrometer(1.05, 30)).toBeGreaterThan(1.05);
    expect(correctHydrometer(1.05, 10)).toBeLessThan(1.05);
  });
});

describe('strength', () => {
  it('agrees with the table of methods (Balling; ASBC polynomial; OIML R 22 ethanol) and the trade’s factor', () => {
    for (const row of table('abv_method_comparison.csv')) {
      expect(abvBalling(row.og!, row.fg!)).toBeCloseTo(row.abv_balling!, 2);
      expect(abvSimple(row.og!, row.fg!)).toBeCloseTo(row.abv_131_25!, 2);
      expect(realExtract(row.OE_plato!, row.AE_plato!)).toBeCloseTo(row.RE_plato!, 2);
      expect(apparentAttenuation(row.og!, row.fg!)!).toBeCloseTo(row.apparent_attenuation_percent_points!, 1);
    }
  });

  it('lightens the liquid by alcohol as OIML R 22 water–ethanol mixtures are light, within 0.5 points to 15 % vol', () => {
    for (const row of table('ethanol_water_20C.csv')) {
      if (row.abv_percent! > 15) continue;
      const e = row.ethanol_g_per_L!;
      const lightened = 1000 * (1 - row.sg2020!);
      expect(Math.abs(0.1885 * e - 2.5e-4 * e * e - lightened)).toBeLessThan(0.5);
      // Sugar for the alcohol gone, and the alcohol itself: what `pointsAtTolerance` takes off.
      expect(100 - pointsAtTolerance(100, row.abv_percent!)).toBeCloseTo(0.789 * 7.89 * row.abv_percent! + 0.1885 * 7.89 * row.abv_percent! - 2.5e-4 * (7.89 * row.abv_percent!) ** 2, 9);
    }
  });
});
