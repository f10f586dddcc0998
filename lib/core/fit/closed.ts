/** A curve with a closed form. */
export interface ClosedCurve {
  parameters: readonly string[];
  lower: readonly number[];
  upper: readonly number[];
  /** Gravity at t; derivatives by parameter j go to out[i + j·m] where `out` is given. */
  value(p: ArrayLike<number>, t: number, out: Float64Array | null, i: number, m: number): number;
}

const logistic: ClosedCurve = {
  parameters: ['OG', 'FG', 'k', 'm'],
  lower: [-50, -150, 1e-4, -60],
  upper: [250, 200, 60, 400],
  value(p, t, out, i, m) {
    const og = p[0]!;
    const fg = p[1]!;
    const x = t - p[3]!;
    const s = 1 / (1 + Math.exp(p[2]! * x));
    if (out) {
      const bend = (og - fg) * s * (1 - s);
      out[i] = s;
      out[i + m] = 1 - s;
      out[i + 2 * m] = -bend * x;
      out[i + 3 * m] = bend * p[2]!;
    }
    return fg + (og - fg) * s;
  },
};

const logistic5: ClosedCurve = {
  parameters: ['OG', 'FG', 'k', 'm', 's'],
  lower: [-50, -150, 1e-4, -60, 0.02],
  upper: [250, 200, 60, 400, 50],
  value(p, t, out, i, m) {
    const og = p[0]!;
    const fg = p[1]!;
    const x = t - p[3]!;
    const z = p[2]! * x;
    // ln of the bracket, safe for large z.
    const l = z > 30 ? z : Math.log1p(Math.exp(z));
    const s = Math.exp(-p[4]! * l);
    if (out) {
      const drop = og - fg;
      const share = 1 / (1 + Math.exp(-z));
      const bend = drop * s * p[4]! * share;
      out[i] = s;
      out[i + m] = 1 - s;
      out[i + 2 * m] = -bend * x;
      out[i + 3 * m] = bend * p[2]!;
      out[i + 4 * m] = -drop * s * l;
    }
    return fg + (og - fg) * s;
  },
};

const gompertz: ClosedCurve = {
  parameters: ['OG', 'FG', 'pace', 'lag'],
  lower: [-50, -150, 1e-3, -60],
  upper: [250, 200, 400, 400],
  value(p, t, out, i, m) {
    const og = p[0]!;
    const drop = og - p[1]!;
    const e = Math.E / drop;
    const x = p[3]! - t;
    const inner = Math.exp(Math.min(50, p[2]! * e * x + 1));
    const y = Math.exp(-inner);
    if (out) {
      const byInner = -drop * y * inner;
      const byDrop = y + byInner * ((-p[2]! * e * x) / drop);
      out[i] = 1 - byDrop;
      out[i + m] = byDrop;
      out[i + 2 * m] = -byInner * e * x;
      out[i + 3 * m] = -byInner * p[2]! * e;
    }
    return og - drop * y;
  },
};

const richards: ClosedCurve = {
  parameters: ['OG', 'FG', 'pace', 'lag', 'shape'],
  lower: [-50, -150, 1e-3, -60, 1e-3],
  upper: [250, 200, 400, 400, 20],
  value(p, t, out, i, m) {
    const og = p[0]!;
    const drop = og - p[1]!;
    const nu = p[4]!;
    const x = p[3]! - t;
    // (1 + ν)^(1 + 1/ν), by its logarithm.
    const power = Math.log1p(nu) * (1 + 1 / nu);
    const c = Math.exp(power);
    const exponent = Math.min(200, (p[2]! / drop) * c * x);
    const u = nu * Math.exp(1 + nu + exponent);
    const y = Math.exp(-Math.log1p(u) / nu);
    if (out) {
      // d(−ln(1 + u)/ν)/dexponent
      const byExponent = (-drop * y * u) / (1 + u) / nu;
      const byDrop = y + byExponent * (-exponent / drop);
      out[i] = 1 - byDrop;
      out[i + m] = byDrop;
      out[i + 2 * m] = -byExponent * (exponent / p[2]!);
      out[i + 3 * m] = -byExponent * (p[2]! / drop) * c;
      const powerByNu = (1 + 1 / nu) / (1 + nu) - Math.log1p(nu) / (nu * nu);
      const lnUByNu = 1 / nu + 1 + exponent * powerByNu;
      const byNu = Math.log1p(u) / (nu * nu) - ((u / (1 + u)) * lnUByNu) / nu;
      out[i + 4 * m] = -drop * y * byNu;
    }
    return og - drop * y;
  },
};

/** The published curves by name; where each is from stands in ./models. */
export const CLOSED = { logistic, logistic5, gompertz, richards };
