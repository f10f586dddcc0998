import { describe, expect, it } from 'vitest';
import { assessEvery } from '../../lib/core/assess';
import { fitModel } from '../../lib/core/fit/models';
import type { BatchSetup, Reading } from '../../lib/core/types';
import { Random } from '../evaluation/random';
import { table } from './tables';

interface Series {
  name: string;
  days: number[];
  points: number[];
}

function seriesOf(name: string, rows: Record<string, number>[], hours: string, points: (row: Record<string, number>) => number): Series {
  return { name, days: rows.map((row) => row[hours]! / 24), points: rows.map(points) };
}

/** Sugar and ethanol, g/L, as gravity points: 0.3865 a g/L of sugar, alcohol lightening as OIML R 22. */
const gravityOf = (sugar: number, ethanol: number): number => 0.3865 * sugar - (0.1885 * ethanol - 2.5e-4 * ethanol * ethanol);

const cramer = table('trajectories/cramer_2002_wine.csv');
const beer = table('trajectories/gee_ramirez_beer.csv');
const oliveira = table('trajectories/oliveira_ethanol.csv');
const agave = table('trajectories/agave_juice_valle_2024.csv');

const wine = (nitrogen: number): Series =>
  seriesOf(`Cramer, Vlassides, Block 2002, ${nitrogen * 1000} mg N/L`, cramer.filter((row) => row.N0_g_L === nitrogen), 'time_h', (row) => 1000 * (row.sg_tabarie_derived! - 1));
const wort = (celsius: number): Series =>
  seriesOf(`Engasser 1981; Gee, Ramirez 1994, ${celsius} °C`, beer.filter((row) => row.temperature_C === celsius), 'time_h', (row) => gravityOf(row.sugar_g_L!, row.ethanol_g_L!));

describe('the kinetic curve follows published ferments', () => {
  // Tolerances as measured, rounded up: root mean square in points.
  it.each([
    [wine(0.05), 0.3],
    [wine(0.15), 0.3],
    [wine(0.3), 0.3],
    [wort(8), 0.5],
    [wort(12), 0.5],
    [wort(16), 0.5],
    [seriesOf('Oliveira (1999, 2017)', oliveira, 'time_h', (row) => gravityOf(row.S_g_L!, row.P_g_L!)), 0.3],
    [seriesOf('agave juice, measured: Valle et al. 2024', agave, 'time_h', (row) => 1000 * (row.sg_tabarie_derived! - 1)), 0.3],
  ] as [Series, number][])('$name', (series, tolerance) => {
    const fit = fitModel('kinetic', series.days, series.points);
    if (fit.reason === 'no fit') throw new Error('no fit');
    expect(fit.rms!).toBeLessThan(tolerance);
  });

  it('closer than the 4-parameter logistic in every one of them', () => {
    for (const series of [wine(0.05), wine(0.15), wine(0.3), wort(8), wort(12), wort(16)]) {
      const kinetic = fitModel('kinetic', series.days, series.points);
      const logistic = fitModel('logistic', series.days, series.points);
      if (kinetic.reason === 'no fit' || logistic.reason === 'no fit') throw new Error('no fit');
      expect(kinetic.rms!).toBeLessThan(logistic.rms!);
    }
  });
});

const PITCH = Date.UTC(2026, 1, 20, 18);

/** A float's record of a published ferment: 0.5 points of noise, every 15 min, held at its last value to the end. */
function recordOf(series: Series, days: number): Reading[] {
  const random = new Random(7, series.name);
  const readings: Reading[] = [];
  let i = 0;
  for (let day = 0; day <= days; day += 1 / 96) {
    while (i < series.days.length - 2 && series.days[i + 1]! < day) i += 1;
    const share = Math.min(1, (day - series.days[i]!) / (series.days[i + 1]! - series.days[i]!));
    const points = series.points[i]! + share * (series.points[i + 1]! - series.points[i]!);
    readings.push({ at: PITCH + Math.round(day * 86_400_000), gravity: 1 + (points + random.normal(0, 0.5)) / 1000, temperature: 20 + random.normal(0, 0.1) });
  }
  return readings;
}

function stalledEver(series: Series, setup: Partial<BatchSetup>, days: number): boolean {
  const full: BatchSetup = {
    kind: 'wine',
    pitchedAt: PITCH,
    originalGravity: 1 + series.points[0]! / 1000,
    volumeL: 5,
    vesselL: 6,
    attenuation: null,
    alcoholToleranceAbv: null,
    temperature: { minC: 15, maxC: 25 },
    events: [],
    ...setup,
  };
  const times: number[] = [];
  for (let day = 0.25; day <= days; day += 0.25) times.push(PITCH + day * 86_400_000);
  for (const { assessment } of assessEvery(full, recordOf(series, days), times, { picture: false })) {
    const { stalled } = assessment.calls;
    if (stalled.verdict === 'yes' && (stalled.kind === 'stuck' || stalled.kind === 'cold')) return true;
  }
  return false;
}

describe('the stall', () => {
  // Sugar as sucrose and no other extract: this must ends near 0.982, so the range is told for it.
  const dry = { attenuation: { min: 1.15, max: 1.22 } };

  it('of the wine short of nitrogen (50 mg N/L, 65 g/L of sugar left) is called', () => {
    expect(stalledEver(wine(0.05), dry, 24)).toBe(true);
  });

  it.each([wine(0.15), wine(0.3)])('is not called of $name', (series) => {
    expect(stalledEver(series, dry, 24)).toBe(false);
  });

  it('is not called of a beer that ends', () => {
    const series = wort(16);
    const og = series.points[0]!;
    const end = series.points[series.points.length - 1]!;
    const attenuation = { min: 1 - end / og - 0.04, max: 1 - end / og + 0.04 };
    expect(stalledEver(series, { kind: 'beer', attenuation }, 14)).toBe(false);
  });
});
