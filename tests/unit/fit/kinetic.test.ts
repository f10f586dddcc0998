import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { KineticCurve, KineticRow } from '../../../lib/core/fit/kinetic';

/** The room that a fit may search: ln κ, ln m, ln Kr, logit δ. */
const parameters = fc
  .tuple(fc.double({ min: -5, max: 3, noNaN: true }), fc.double({ min: -5, max: 3.5, noNaN: true }), fc.double({ min: -6, max: 3, noNaN: true }), fc.double({ min: -6, max: 6, noNaN: true }))
  .map((shape) => Float64Array.from([60, 4, ...shape]));
const ages = fc.array(fc.double({ min: 0, max: 90, noNaN: true }), { minLength: 1, maxLength: 40 });

/** Left side of the separated equation less its right one, at a share s. */
function miss(p: Float64Array, tau: number, x: number): number {
  const m = Math.exp(p[3]!);
  const kr = Math.exp(p[4]!);
  const k = Math.exp(p[2]!) * (1 + kr);
  const delta = 1 / (1 + Math.exp(-p[5]!));
  const w = 0.18 * m + 0.02;
  const softplus = (z: number): number => (z > 30 ? z : Math.log1p(Math.exp(z)));
  const s = Math.exp(x);
  const l = Math.log1p(-delta * (1 - s));
  const scale = (kr + s) / (1 - delta + delta * s);
  return ((kr / (1 - delta)) * (x - l) + l / delta + k * w * (softplus((tau - m) / w) - softplus(-m / w))) / scale;
}

describe('the solution of the reduced kinetic curve', () => {
  it('satisfies its equation, whatever was asked before', () => {
    fc.assert(
      fc.property(parameters, ages, (p, taus) => {
        const curve = new KineticCurve(p);
        for (const tau of taus) {
          const x = curve.solve(tau);
          if (tau > 0 && x > -60) expect(Math.abs(miss(p, tau, x))).toBeLessThan(1e-9);
        }
      }),
    );
  });

  it('is the same for a row as for the curve, and serves the derivatives at other parameters too', () => {
    fc.assert(
      fc.property(parameters, parameters, ages, (p, q, taus) => {
        const n = taus.length;
        const row = new KineticRow(taus, n);
        const values = new Float64Array(n);
        row.gravities(p, values);
        const there = new Float64Array(6 * n);
        row.gradients(q, there, n);
        const here = new Float64Array(6 * n);
        row.gravities(p, new Float64Array(n));
        row.gradients(p, here, n);
        const curves = [new KineticCurve(p), new KineticCurve(q)] as const;
        const out = new Float64Array(6);
        taus.forEach((tau, i) => {
          expect(values[i]).toBeCloseTo(curves[0].gradient(tau, out, 0, 1), 9);
          out.forEach((value, j) => expect(here[j * n + i]).toBeCloseTo(value, 7));
          curves[1].gradient(tau, out, 0, 1);
          out.forEach((value, j) => expect(there[j * n + i]).toBeCloseTo(value, 7));
        });
      }),
    );
  });
});
