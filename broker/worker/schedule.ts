/** A word from a person is acted on at once, but not in a tight loop. */
const URGENT_SPACING_MS = 1_000;

/**
 * When each batch is to be judged next: after new readings, but not more often
 * than the spacing; a batch asked for many times is judged once. Pure but for
 * what it remembers.
 */
export class Schedule {
  private readonly dueAt = new Map<string, number>();
  private readonly judgedAt = new Map<string, number>();
  private readonly urgent = new Set<string>();

  constructor(private readonly spacingMs: number) {}

  /** New readings, or the tick. */
  ask(batch: string, now: number): void {
    this.at(batch, this.earliest(batch, now, this.spacingMs));
  }

  /** Somebody logged or changed something and looks at the page. */
  askSoon(batch: string, now: number): void {
    this.urgent.add(batch);
    this.at(batch, this.earliest(batch, now, Math.min(this.spacingMs, URGENT_SPACING_MS)));
  }

  /** It could not be done; again after that time. */
  askAfter(batch: string, at: number): void {
    this.at(batch, at);
  }

  /** The next batch whose time has come, taken from the list: one that somebody looks at first, then the longest waiting; null: none yet. */
  take(now: number): string | null {
    let next: string | null = null;
    for (const [batch, at] of this.dueAt) if (at <= now && (next === null || this.before(batch, next))) next = batch;
    if (next === null) return null;
    this.dueAt.delete(next);
    this.urgent.delete(next);
    this.judgedAt.set(next, now);
    return next;
  }

  private before(a: string, b: string): boolean {
    const [urgentA, urgentB] = [this.urgent.has(a), this.urgent.has(b)];
    return urgentA === urgentB ? this.dueAt.get(a)! < this.dueAt.get(b)! : urgentA;
  }

  /** When the next one is due; null: nothing waits. */
  nextAt(): number | null {
    return this.dueAt.size ? Math.min(...this.dueAt.values()) : null;
  }

  get waiting(): number {
    return this.dueAt.size;
  }

  /** Drops the memory of batches judged so long ago that it no longer holds anything back. */
  forget(now: number): void {
    for (const [batch, at] of this.judgedAt) if (now - at > this.spacingMs) this.judgedAt.delete(batch);
  }

  private earliest(batch: string, now: number, spacing: number): number {
    const last = this.judgedAt.get(batch);
    // A clock set back must not hold a batch for hours.
    return last === undefined || last > now ? now : Math.max(now, last + spacing);
  }

  private at(batch: string, at: number): void {
    this.dueAt.set(batch, Math.min(at, this.dueAt.get(batch) ?? Infinity));
  }
}
