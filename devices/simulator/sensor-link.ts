import mqtt, { type MqttClient } from 'mqtt';
import { readingsTopic, settingsTopic } from '@/lib/contracts/topics';
import { sensorSettings, type SensorSettings, type TelemetryReading } from '@/lib/contracts/telemetry';
import { Memory } from './memory';

/** Half a year at 15 minutes. */
const MEMORY_READINGS = 20_000;
/** About 25 kB: a small device's packet, well under what a broker takes. */
const READINGS_PER_MESSAGE = 200;
const RECONNECT_MS = 2_000;

export type LinkState = 'connected' | 'closed' | 'refused';

export interface LinkOptions {
  url: string;
  sensor: string;
  secret: string;
  /** Told when the link comes up, goes down, or cannot come up; once for each change. */
  onState?: (state: LinkState, detail?: string) => void;
  /** Told when the broker hands down settings. */
  onSettings?: (settings: SensorSettings) => void;
  reconnectMs?: number;
}

/** The broker's address without credentials of its own: a sensor signs in as itself. */
function bare(url: string): string {
  const parsed = new URL(url);
  parsed.username = '';
  parsed.password = '';
  return parsed.toString();
}

/** A small device trusts nobody's bytes: what is not settings is left be. */
function settingsIn(payload: Buffer): SensorSettings | null {
  try {
    return sensorSettings.safeParse(JSON.parse(payload.toString('utf8'))).data ?? null;
  } catch {
    return null;
  }
}

/**
 * One float's way to the broker: QoS 1, one message in flight, in order. What is
 * not acknowledged stays here, or in the client's own store, and goes again after
 * a reconnect.
 */
export class SensorLink {
  private readonly client: MqttClient;
  private readonly memory = new Memory<TelemetryReading>(MEMORY_READINGS);
  private inFlight = 0;
  private sent = 0;
  private state: LinkState | null = null;
  private idle: (() => void)[] = [];

  constructor(private readonly options: LinkOptions) {
    const { sensor, secret } = options;
    this.client = mqtt.connect(bare(options.url), {
      clientId: `float-${sensor}-${process.pid}`,
      username: sensor,
      password: secret,
      clean: true,
      reconnectPeriod: options.reconnectMs ?? RECONNECT_MS,
      reconnectOnConnackError: true,
    });
    this.client.on('connect', () => {
      this.report('connected');
      this.client.subscribe(settingsTopic(options.sensor), { qos: 1 });
      this.pump();
    });
    this.client.on('message', (_topic, payload) => {
      const settings = settingsIn(payload);
      if (settings) options.onSettings?.(settings);
    });
    this.client.on('close', () => {
      if (this.state === 'connected') this.report('closed');
    });
    this.client.on('error', (error) => this.report('refused', error.message));
  }

  /** Readings acknowledged by the broker. */
  get acknowledged(): number {
    return this.sent;
  }

  /** Readings not yet acknowledged. */
  get waiting(): number {
    return this.memory.size + this.inFlight;
  }

  /** Readings that the memory could not hold. */
  get overwritten(): number {
    return this.memory.overwritten;
  }

  send(reading: TelemetryReading): void {
    this.memory.add(reading);
  }

  /** Sends what waits, if the link is up and nothing is in flight. */
  pump(): void {
    if (this.inFlight > 0 || !this.client.connected) return;
    const readings = this.memory.take(READINGS_PER_MESSAGE);
    if (readings.length === 0) return;
    this.inFlight = readings.length;
    const body = JSON.stringify(readings.length === 1 ? readings[0] : readings);
    this.client.publish(readingsTopic(this.options.sensor), body, { qos: 1 }, (error) => {
      this.inFlight = 0;
      if (!error) this.sent += readings.length;
      this.pump();
      if (this.waiting === 0) for (const done of this.idle.splice(0)) done();
    });
  }

  private report(state: LinkState, detail?: string): void {
    if (state === this.state) return;
    this.state = state;
    this.options.onState?.(state, detail);
  }

  /** Waits until all is acknowledged, at most so long, then closes. */
  async close(patienceMs: number): Promise<void> {
    if (this.waiting > 0 && this.client.connected) {
      await new Promise<void>((resolve) => {
        const timer = setTimeout(resolve, patienceMs);
        this.idle.push(() => {
          clearTimeout(timer);
          resolve();
        });
        this.pump();
      });
    }
    await this.client.endAsync(true);
  }
}
