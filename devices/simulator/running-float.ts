import type { Clock } from '@/lib/clock';
import type { TelemetryReading } from '@/lib/contracts/telemetry';
import type { Instant } from '@/lib/core/types';
import { byArrival, series, type SimulatedReading } from './generate';
import { scenarioNamed } from './scenarios';
import type { SimulatedSensor } from './sensors-file';

/** Where readings go: kept until acknowledged, sent when `pump` finds the way free. */
export interface Outlet {
  send(reading: TelemetryReading): void;
  pump(): void;
}

/** One simulated float at work: hands over what is due by the clock. */
export class RunningFloat {
  private readonly source: Iterator<SimulatedReading, void>;
  private next: SimulatedReading | undefined;

  constructor(
    entry: SimulatedSensor,
    private readonly link: Outlet,
    private readonly clock: Clock,
    /** Readings that arrived before this are left out. */
    from: Instant,
  ) {
    const options = { seed: entry.seed, start: Date.parse(entry.startedAt), intervalMin: entry.interval_s / 60 };
    this.source = byArrival(series(scenarioNamed(entry.scenario), options));
    do this.advance();
    while (this.next && this.next.arrivesAt < from);
  }

  /** True when its cell is flat and all is handed over. */
  get over(): boolean {
    return this.next === undefined;
  }

  tick(): void {
    const now = this.clock.now();
    while (this.next && this.next.arrivesAt <= now) {
      this.link.send(this.next.body);
      this.advance();
    }
    this.link.pump();
  }

  private advance(): void {
    const { value } = this.source.next();
    this.next = value ?? undefined;
  }
}
