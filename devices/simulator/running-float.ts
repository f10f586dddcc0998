import type { Clock } from '@/lib/clock';
import type { SensorSettings, TelemetryReading } from '@/lib/contracts/telemetry';
import type { Instant } from '@/lib/core/types';
import { byArrival, series, type SimulatedReading } from './generate';
import { scenarioNamed } from './scenarios';
import type { SimulatedSensor } from './sensors-file';

/** Where readings go: kept until acknowledged, sent when `pump` finds the way free. */
export interface Outlet {
  send(reading: TelemetryReading): void;
  pump(): void;
}

/** A float does not speak more often than this, whatever it is told, s. */
const LEAST_INTERVAL_S = 10;

/** One simulated float at work: hands over what is due by the clock, as often as it was told. */
export class RunningFloat {
  private source: Iterator<SimulatedReading, void>;
  private next: SimulatedReading | undefined;
  private intervalS: number;
  /** The settings in force, said with every reading; null: as it was made. */
  private version: number | null = null;

  constructor(
    private readonly entry: SimulatedSensor,
    private readonly link: Outlet,
    private readonly clock: Clock,
    /** Readings that arrived before this are left out. */
    from: Instant,
  ) {
    this.intervalS = entry.interval_s;
    this.source = this.from();
    this.skipTo(from);
  }

  /** True when its cell is flat and all is handed over. */
  get over(): boolean {
    return this.next === undefined;
  }

  /** Speaks at the new interval from now on, and says so. */
  obey({ version, interval_s }: SensorSettings): void {
    if (version === this.version || interval_s < LEAST_INTERVAL_S) return;
    this.version = version;
    if (interval_s === this.intervalS) return;
    this.intervalS = interval_s;
    this.source = this.from();
    this.skipTo(this.clock.now());
  }

  tick(): void {
    const now = this.clock.now();
    while (this.next && this.next.arrivesAt <= now) {
      const { body } = this.next;
      this.link.send(this.version === null ? body : { ...body, settings: this.version });
      this.advance();
    }
    this.link.pump();
  }

  private from(): Iterator<SimulatedReading, void> {
    const { scenario, seed, startedAt } = this.entry;
    return byArrival(series(scenarioNamed(scenario), { seed, start: Date.parse(startedAt), intervalMin: this.intervalS / 60 }));
  }

  private skipTo(at: Instant): void {
    do this.advance();
    while (this.next && this.next.arrivesAt < at);
  }

  private advance(): void {
    const { value } = this.source.next();
    this.next = value ?? undefined;
  }
}
