import { describe, expect, it } from 'vitest';
import { fitModel, modelGravity, type ModelFit } from '@/lib/core/fit/models';

const TRUTH = { logistic: [62, 4, 1.1, 3], logistic5: [62, 4, 1.1, 3, 0.6], kinetic: [62, 4, -0.8, 0.1, -1.2, -0.5] } as const;

describe('a curve over a long record', () => {
  // Means of neighbours lie off a bent curve: an answer by the groups alone would leave squares behind.
  it.each(Object.entries(TRUTH))('is fitted to each of its points, not only to their groups: %s', (model, truth) => {
    const days = Array.from({ length: 3000 }, (_, i) => (i / 3000) ** 2 * 14);
    const points = days.map((day) => modelGravity(model as keyof typeof TRUTH, truth, day));
    const fit = fitModel(model as keyof typeof TRUTH, days, points) as ModelFit;
    expect(fit.sumOfSquares).toBeLessThan(1e-9);
    fit.parameters.forEach((value, j) => expect(value).toBeCloseTo(truth[j]!, 5));
  });
});
