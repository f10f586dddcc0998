import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { fitModel, modelGravity } from '../../lib/core/fit/models';
import { table } from './tables';

/** M. H. Zwietering et al., Applied and Environmental Microbiology 56 (1990) 1875–1881: A = 9.2, pace 0.35, lag 6. */
const growth = JSON.parse(readFileSync(new URL('./data/growth_models.json', import.meta.url), 'utf8')) as {
  zwietering_1990: { values: { t: number; gompertz: number; 'richards_nu_0.5': number }[] };
  pearl_logistic_carlson: { least_squares_unweighted: { K: number; r_per_h: number; rss: number } };
};

describe('Zwietering’s curves', () => {
  it('have the values computed from the paper’s forms; the fall counts from the original gravity', () => {
    for (const row of growth.zwietering_1990.values) {
      expect(100 - modelGravity('gompertz', [100, 100 - 9.2, 0.35, 6], row.t)).toBeCloseTo(row.gompertz, 4);
      expect(100 - modelGravity('richards', [100, 100 - 9.2, 0.35, 6, 0.5], row.t)).toBeCloseTo(row['richards_nu_0.5'], 4);
    }
  });
});

describe('a logistic curve', () => {
  it('fits Carlson’s yeast of 1913 (Pearl, Q. Rev. Biol. 2 (1927)) with the least squares found independently', () => {
    const rows = table('trajectories/carlson_1913_yeast.csv');
    // Growth is a fall turned upside down.
    const fit = fitModel('logistic', rows.map((row) => row.time_h!), rows.map((row) => -row.yeast_amount!), {
      start: [0, -660, 0.5, 8],
      lower: [-1e-9, -2000, 0.01, 0],
      upper: [1e-9, 0, 5, 30],
    });
    if (fit.reason === 'no fit') throw new Error('no fit');
    const { K, r_per_h: r, rss } = growth.pearl_logistic_carlson.least_squares_unweighted;
    expect(-fit.parameters![1]!).toBeCloseTo(K, 2);
    expect(fit.parameters![2]!).toBeCloseTo(r, 4);
    expect(fit.sumOfSquares).toBeCloseTo(rss, 2);
  });
});
