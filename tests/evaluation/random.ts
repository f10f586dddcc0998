/** Seeded randomness: the same seed gives the same catalogue on every machine. */
export class Random {
  private a: number;
  private b: number;
  private c: number;
  private d = 1;

  /** Small fast counter generator (sfc32, Chris Doty-Humphrey's PractRand), seeded by a seed and a name. */
  constructor(seed: number, name = '') {
    let h = 2166136261 ^ seed;
    for (let i = 0; i < name.length; i += 1) h = Math.imul(h ^ name.charCodeAt(i), 16777619);
    this.a = h >>> 0;
    this.b = Math.imul(h, 2654435761) >>> 0;
    this.c = (seed * 40503 + 17) >>> 0;
    for (let i = 0; i < 15; i += 1) this.next();
  }

  /** Uniform in [0, 1). */
  next(): number {
    const t = (((this.a + this.b) | 0) + this.d) | 0;
    this.d = (this.d + 1) | 0;
    this.a = this.b ^ (this.b >>> 9);
    this.b = (this.c + (this.c << 3)) | 0;
    this.c = (this.c << 21) | (this.c >>> 11);
    this.c = (this.c + t) | 0;
    return (t >>> 0) / 4294967296;
  }

  between(lo: number, hi: number): number {
    return lo + (hi - lo) * this.next();
  }

  normal(mean = 0, sd = 1): number {
    const u = Math.max(1e-12, this.next());
    return mean + sd * Math.sqrt(-2 * Math.log(u)) * Math.cos(2 * Math.PI * this.next());
  }

  /** Log-normal about a median; `spread` is the standard deviation of the logarithm. */
  about(median: number, spread: number): number {
    return median * Math.exp(this.normal(0, spread));
  }

  chance(p: number): boolean {
    return this.next() < p;
  }

  pick<T>(items: readonly T[]): T {
    return items[Math.floor(this.next() * items.length)]!;
  }
}
