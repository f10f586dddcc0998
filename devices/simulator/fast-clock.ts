import type { Clock } from '@/lib/clock';
import type { Instant } from '@/lib/core/types';

/**
 * A clock that starts in the past, runs fast, and goes on as the real one when it
 * has caught up: the server refuses what is measured ahead of it.
 */
export class FastClock implements Clock {
  private readonly began: Instant;

  constructor(
    private readonly real: Clock,
    private readonly from: Instant,
    private readonly speed: number,
  ) {
    this.began = real.now();
  }

  now(): Instant {
    const real = this.real.now();
    return Math.min(real, this.from + (real - this.began) * this.speed);
  }
}
