/** The one place that reads the time, so that a test can move it. */
export interface Clock {
  /** Milliseconds since 1970-01-01T00:00:00Z. */
  now(): number;
}

export const systemClock: Clock = { now: () => Date.now() };

/** A clock that stands still until it is moved. */
export class ManualClock implements Clock {
  constructor(private at: number) {}
  now(): number {
    return this.at;
  }
  set(at: number): void {
    this.at = at;
  }
  advance(ms: number): void {
    this.at += ms;
  }
}
