import { execFile } from 'node:child_process';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { QueryTypes, type Sequelize } from 'sequelize';
import { connect } from '@/db/client';
import { migrate } from '@/db/migrate';
import { freePort, postgresBinaries, startCluster, type Cluster } from '@/scripts/lib/postgres';
import { Device } from './devices';
import { buildSensor } from './factories';
import { startProcess, until, type Running } from './processes';

const run = promisify(execFile);

/** A PostgreSQL of its own, a broker's process in front of it, and devices that press on it: for what kills and stalls. */
export class PressedBroker {
  broker!: Running;
  devices: Device[] = [];

  private constructor(
    readonly cluster: Cluster,
    readonly port: number,
    private readonly folder: string,
    readonly sequelize: Sequelize,
  ) {}

  static async build(): Promise<PressedBroker> {
    const folder = await mkdtemp(join(tmpdir(), 'fallbright-pressed-'));
    const cluster = await startCluster(join(folder, 'postgres'), await freePort());
    const sequelize = connect(cluster.url);
    await migrate(sequelize);
    return new PressedBroker(cluster, await freePort(26_000), folder, sequelize);
  }

  async startBroker(): Promise<void> {
    this.broker = await startProcess('broker/server.ts', { DATABASE_URL: this.cluster.url, MQTT_PORT: String(this.port), DATA_DIR: this.folder }, 'broker ready');
  }

  async killBroker(signal: NodeJS.Signals = 'SIGKILL'): Promise<number | null> {
    this.broker.kill(signal);
    return this.broker.ended;
  }

  /** Kills the database's server, as a loss of power would; its processes notice and go. */
  async killDatabase(): Promise<void> {
    const pid = await this.cluster.pid();
    process.kill(pid, 'SIGKILL');
    await until('the server to be gone', () => !isAlive(pid));
  }

  /** Starts the database after a kill: the old server's shared memory may take a moment to go. */
  async startDatabase(): Promise<void> {
    await until(
      'the database to start',
      () =>
        this.cluster.start().then(
          () => true,
          () => false,
        ),
      30_000,
    );
  }

  /** Devices that send one reading after another until told to stop. */
  async press(count: number, options: { inFlight?: number; everyMs?: number; keepalive?: number } = {}): Promise<void> {
    for (let index = 0; index < count; index += 1) {
      const { sensor, secret } = await buildSensor();
      this.devices.push(new Device({ port: this.port, sensor: sensor.identifier, secret, ...options }));
    }
    for (const device of this.devices) device.run();
    await until('every device to have an acknowledgement', () => this.devices.every((device) => device.acknowledged.size > 0), 20_000);
  }

  /** Stops the devices once all they sent is acknowledged. */
  async settle(patienceMs = 30_000): Promise<void> {
    for (const device of this.devices) device.stop();
    await Promise.all(this.devices.map((device) => device.settle(patienceMs)));
  }

  get acknowledged(): number {
    return this.devices.reduce((sum, device) => sum + device.acknowledged.size, 0);
  }

  /** Acknowledged readings that are not in the table: must be none, at any moment. */
  async missing(): Promise<string[]> {
    // Taken before the question: what is acknowledged later may come too late for the answer.
    const promised = this.devices.map((device) => ({ sensor: device.sensor, times: [...device.acknowledged] }));
    const lost: string[] = [];
    for (const { sensor, times } of promised) {
      const rows = await this.sequelize.query<{ at: Date }>('select r.measured_at as at from readings r join sensors s on s.id = r.sensor_id where s.identifier = $1', { bind: [sensor], type: QueryTypes.SELECT });
      const stored = new Set(rows.map((row) => row.at.toISOString()));
      lost.push(...times.filter((at) => !stored.has(at)).map((at) => `${sensor} ${at}`));
    }
    return lost;
  }

  async count(table: 'readings' | 'refusals'): Promise<number> {
    const [row] = await this.sequelize.query<{ n: number }>(`select count(*)::int as n from ${table}`, { type: QueryTypes.SELECT });
    return row!.n;
  }

  /** PostgreSQL's own check of tables and indexes; throws with its words where something is damaged. */
  async checkDatabase(): Promise<void> {
    await this.sequelize.query('create extension if not exists amcheck');
    await run(`${await postgresBinaries()}/pg_amcheck`, ['--heapallindexed', this.cluster.url]);
  }

  async close(): Promise<void> {
    await Promise.all(this.devices.map((device) => device.close()));
    if (this.broker) await this.killBroker();
    await this.sequelize.close();
    await this.cluster.stop('immediate').catch(() => undefined);
    await rm(this.folder, { recursive: true, force: true });
  }
}

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch {
    return false;
  }
}

/** From now until the next acknowledgement, ms. */
export async function untilServed(pressed: PressedBroker, patienceMs = 20_000): Promise<number> {
  const began = Date.now();
  const before = pressed.acknowledged;
  await until('an acknowledgement', () => pressed.acknowledged > before, patienceMs);
  return Date.now() - began;
}
