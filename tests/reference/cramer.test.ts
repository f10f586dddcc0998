/**
 * A. C. Cramer, S. Vlassides, D. E. Block, Kinetic model for nitrogen-limited wine
 * fermentations, Biotechnology and Bioengineering 77 (2002) 49-60: the plain model
 * against solutions computed elsewhere (LSODA, rtol 1e-10) from the published
 * equations and parameters, and its gravities by Tabarié (OIV-MA-AS2-03B).
 */
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { CRAMER_2002, rates, type Broth } from '@/devices/simulator/cramer';
import { gravityOf } from '@/devices/simulator/density';
import { rungeKutta } from '@/devices/simulator/integrate';

interface Row extends Broth {
  nitrogenAtStart: number;
  hours: number;
  gravity: number;
}

const rows: Row[] = readFileSync(new URL('./data/cramer_2002_wine.csv', import.meta.url), 'utf8')
  .split('\n')
  .filter((line) => /^\d/.test(line))
  .map((line) => {
    const [nitrogenAtStart = NaN, hours = NaN, cells = NaN, nitrogen = NaN, ethanol = NaN, sugar = NaN, , gravity = NaN] = line.split(',').map(Number);
    return { nitrogenAtStart, hours, cells, nitrogen, ethanol, sugar, gravity };
  });

/** The published runs: 250 g/L of sugar, 0.1 g/L of cells. */
function solve(nitrogen: number, until: number): Broth {
  const step = 0.1;
  let state = [0.1, nitrogen, 0, 250];
  for (let index = 0; index < Math.round(until / step); index += 1) {
    state = rungeKutta(
      (_time, [cells = 0, left = 0, ethanol = 0, sugar = 0]) => {
        const slope = rates(CRAMER_2002, { cells, nitrogen: left, ethanol, sugar });
        return [slope.cells, slope.nitrogen, slope.ethanol, slope.sugar];
      },
      index * step,
      state,
      step,
    );
  }
  const [cells = NaN, left = NaN, ethanol = NaN, sugar = NaN] = state;
  return { cells, nitrogen: left, ethanol, sugar };
}

describe('the wine model of Cramer, Vlassides and Block (2002)', () => {
  const starts = [0.05, 0.15, 0.3];

  test.each(starts)('follows the reference solution with %f g/L of nitrogen to a thousandth of a gram', (start) => {
    const mine = rows.filter((row) => row.nitrogenAtStart === start && row.hours % 24 === 0);
    expect(mine.length).toBe(15);
    for (const row of mine) {
      const got = solve(start, row.hours);
      expect(Math.abs(got.sugar - row.sugar), `sugar at ${row.hours} h`).toBeLessThan(1e-3);
      expect(Math.abs(got.ethanol - row.ethanol), `ethanol at ${row.hours} h`).toBeLessThan(1e-3);
      expect(Math.abs(got.cells - row.cells), `cells at ${row.hours} h`).toBeLessThan(1e-3);
      expect(Math.abs(got.nitrogen - row.nitrogen), `nitrogen at ${row.hours} h`).toBeLessThan(1e-5);
    }
  });

  test('sticks with sugar left when nitrogen is short, and not when there is enough', () => {
    expect(solve(0.05, 336).sugar).toBeGreaterThan(60);
    expect(solve(0.15, 150).sugar).toBeLessThan(4);
    expect(solve(0.3, 78).sugar).toBeLessThan(4);
  });

  test('gives the gravities of Tabarié’s relation to the last printed digit', () => {
    const worst = Math.max(...rows.map((row) => Math.abs(gravityOf(row.sugar, row.ethanol) - row.gravity)));
    expect(worst).toBeLessThan(1.1e-5);
  });
});
