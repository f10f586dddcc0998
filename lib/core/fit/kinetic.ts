/**
 * The reduced kinetic curve (our own), in thermal time τ (days at 20 °C):
 *
 *   dS/dτ = −k a(τ) S/(Kr + S) (1 − δ(1 − S)),  S(0) = 1,  g = FG + (OG − FG) S
 *   a(τ) = 1/(1 + exp(−(τ − m)/w)),  w = 0.18 m + 0.02
 *
 * S is the share of the whole fall still to come, m the onset (lag and growth),
 * Kr where uptake stops being saturated, δ the inhibition that grows with alcohol
 * and age. The equation separates, so it is solved and not stepped:
 *
 *   (Kr/D) ln(S/(D + δS)) + ln(D + δS)/δ = −k A(τ),  D = 1 − δ,  A = ∫a dτ
 *
 * by Halley's method in ln S (each step cubes the error). Parameters, in this order: OG and FG in points,
 * ln κ, ln m, ln Kr, logit δ, where κ = k/(1 + Kr) is the pace of a full must a
 * day: unlike k it hardly hangs together with Kr.
 */
export const KINETIC_PARAMETERS = 6;
/** A step in ln S after which what is left of the error, its cube, no longer counts. */
const CLOSE = 1e-5;
/** Steps in which the steepest place is sought. */
const PEAK_STEPS = 60;

const softplus = (z: number): number => (z > 30 ? z : Math.log1p(Math.exp(z)));
/** Beyond 37 it is 1 to the last digit. */
const logistic = (z: number): number => (z > 37 ? 1 : 1 / (1 + Math.exp(-z)));

export class KineticCurve {
  readonly og: number;
  readonly fg: number;
  readonly k: number;
  readonly m: number;
  readonly kr: number;
  readonly delta: number;
  private readonly w: number;
  private readonly base: number;
  /** ∂/∂ln m of w·base, over m. */
  private readonly baseByM: number;
  /** Last solution, ln S, with its k A and its slope: the next τ is usually a little later. */
  private x = 0;
  private gone = 0;
  private slope: number;
  private peak: { until: number; at: number } | null = null;

  constructor(parameters: ArrayLike<number>) {
    this.og = parameters[0]!;
    this.fg = parameters[1]!;
    this.m = Math.exp(parameters[3]!);
    this.kr = Math.exp(parameters[4]!);
    this.k = Math.exp(parameters[2]!) * (1 + this.kr);
    this.delta = logistic(parameters[5]!);
    this.w = 0.18 * this.m + 0.02;
    const z0 = -this.m / this.w;
    this.base = softplus(z0);
    this.baseByM = logistic(z0) * (1 + 0.18 * z0);
    this.slope = 1 / (this.kr + 1);
  }

  /** ln S at τ. */
  solve(tau: number): number {
    return tau <= 0 ? 0 : this.after(softplus((tau - this.m) / this.w) - this.base);
  }

  /** ln S once A has come to `rise` · w. */
  private after(rise: number): number {
    const { kr, delta } = this;
    const d = 1 - delta;
    const gone = this.k * this.w * rise;
    let x = Math.max(this.x - 3, Math.min(0, this.x - (gone - this.gone) * this.slope));
    let slope = this.slope;
    for (let i = 0; i < 60; i += 1) {
      const s = Math.exp(x);
      const e = d + delta * s;
      const l = Math.log1p(-delta * (1 - s));
      const f = (kr / d) * (x - l) + l / delta + gone;
      slope = e / (kr + s);
      const newton = f * slope;
      // f''/(2f') by x is s(D − δKr)/(2e(Kr + s)).
      const step = newton / Math.max(0.5, 1 - (newton * s * (d - delta * kr)) / (2 * e * (kr + s)));
      const next = x - Math.max(-3, Math.min(3, step));
      x = next > 0 ? 0 : next;
      if (Math.abs(step) < CLOSE || x < -60) break;
    }
    this.slope = slope;
    this.gone = gone;
    this.x = Math.max(x, -60);
    return this.x;
  }

  /** Share of the fall still to come at τ, 1 to 0. */
  share(tau: number): number {
    return Math.exp(this.solve(tau));
  }

  /** Gravity at τ, points. */
  gravity(tau: number): number {
    return this.fg + (this.og - this.fg) * this.share(tau);
  }

  /** Fall at τ, points a day of thermal time (positive). */
  rate(tau: number): number {
    const s = this.share(tau);
    const a = logistic((tau - this.m) / this.w);
    return ((this.og - this.fg) * this.k * a * s * (1 - this.delta * (1 - s))) / (this.kr + s);
  }

  /** τ at which the fall is steepest, days; to about a sixtieth of the span up to `tau` or well past the onset. */
  peakTau(tau: number): number {
    const until = Math.max(tau, 3 * this.m + 1);
    if (this.peak?.until === until) return this.peak.at;
    let at = 0;
    let most = 0;
    for (let i = 1; i <= PEAK_STEPS; i += 1) {
      const here = (i / PEAK_STEPS) * until;
      const rate = this.rate(here);
      if (rate > most) {
        most = rate;
        at = here;
      }
    }
    this.peak = { until, at };
    return at;
  }

  /** τ at which the share still to come has fallen to `s`; Infinity for 0. */
  tauOfShare(s: number): number {
    if (s >= 1) return 0;
    if (s <= 0) return Number.POSITIVE_INFINITY;
    const d = 1 - this.delta;
    const l = Math.log1p(-this.delta * (1 - s));
    const gone = -((this.kr / d) * (Math.log(s) - l) + l / this.delta);
    const y = gone / this.k / this.w + this.base;
    // Inverse of softplus: ln(e^y − 1).
    const z = y > 30 ? y : Math.log(Math.expm1(y));
    return this.m + this.w * z;
  }

  /** Gravity at τ; its derivatives by the six parameters go to out[at], out[at + stride], … Where ln S and S are known already they need not be found again. */
  gradient(tau: number, out: Float64Array, at: number, stride: number, x = this.solve(tau), s = Math.exp(x)): number {
    const { kr, delta, k, m, w } = this;
    const drop = this.og - this.fg;
    out[at] = s;
    out[at + stride] = 1 - s;
    if (tau <= 0) {
      for (let j = 2; j < 6; j += 1) out[at + j * stride] = 0;
      return this.og;
    }
    const d = 1 - delta;
    const e = d + delta * s;
    const l = Math.log1p(-delta * (1 - s));
    const z = (tau - m) / w;
    const rise = softplus(z) - this.base;
    const byM = 0.18 * rise - logistic(z) * (1 + 0.18 * z) + this.baseByM;
    const byX = (kr + s) / e;
    const f = -(drop * s) / byX;
    const lByDelta = -(1 - s) / e;
    const byDelta = (kr / (d * d)) * (x - l) - (kr / d) * lByDelta + lByDelta / delta - l / (delta * delta);
    out[at + 2 * stride] = f * k * w * rise;
    out[at + 3 * stride] = f * k * m * byM;
    out[at + 4 * stride] = f * ((kr / d) * (x - l) + (k * w * rise * kr) / (1 + kr));
    out[at + 5 * stride] = f * byDelta * delta * d;
    return this.fg + drop * s;
  }
}

/**
 * The curve over one row of ages, as a solver asks for it: first its values at some
 * parameters, then mostly their derivatives at the same, for which it is solved already.
 */
export class KineticRow {
  /** ln S at each age, and S. */
  private readonly solved: Float64Array;
  private readonly shares: Float64Array;
  private readonly parameters = new Float64Array(KINETIC_PARAMETERS);
  private curve: KineticCurve | null = null;

  constructor(
    private readonly tau: ArrayLike<number>,
    private readonly n: number,
  ) {
    this.solved = new Float64Array(n);
    this.shares = new Float64Array(n);
  }

  private at(parameters: Float64Array): KineticCurve {
    if (this.curve && parameters.every((value, j) => value === this.parameters[j])) return this.curve;
    this.parameters.set(parameters);
    this.curve = new KineticCurve(parameters);
    const { solved, shares } = this;
    for (let i = 0; i < this.n; i += 1) {
      const x = this.curve.solve(this.tau[i]!);
      solved[i] = x;
      shares[i] = Math.exp(x);
    }
    return this.curve;
  }

  /** Gravities, points, to out[0..n). */
  gravities(parameters: Float64Array, out: Float64Array): void {
    const { og, fg } = this.at(parameters);
    for (let i = 0; i < this.n; i += 1) out[i] = fg + (og - fg) * this.shares[i]!;
  }

  /** Derivative of gravity i by parameter j, to out[j·stride + i]. */
  gradients(parameters: Float64Array, out: Float64Array, stride: number): void {
    const curve = this.at(parameters);
    for (let i = 0; i < this.n; i += 1) curve.gradient(this.tau[i]!, out, i, stride, this.solved[i]!, this.shares[i]!);
  }
}
