import '@/lib/config/dot-env';
import { join } from 'node:path';
import { systemClock } from '@/lib/clock';
import { env, EnvError } from '@/lib/config/env';
import type { SensorSettings } from '@/lib/contracts/telemetry';
import { logFor } from '@/lib/log';
import { FastClock } from './fast-clock';
import { OptionError, parseOptions, plan, USAGE, type Plan } from './options';
import { RunningFloat } from './running-float';
import { scenarios } from './scenarios';
import { SensorLink } from './sensor-link';
import { readSensorsFile, SensorsFileError, SIMULATORS_FILE } from './sensors-file';

const TICK_MS = 250;
const PATIENCE_MS = 3_000;

function list(): string {
  const width = Math.max(...Object.keys(scenarios).map((name) => name.length)) + 2;
  return Object.values(scenarios)
    .map(({ name, shows }) => name.padEnd(width) + shows)
    .join('\n');
}

/** The broker that the ingest listens to: an existing one where it is named, else the embedded one. */
function brokerUrl(): string {
  const { MQTT_URL, MQTT_PORT, HOST } = env();
  return MQTT_URL ?? `mqtt://${HOST === '0.0.0.0' || HOST === '::' ? '127.0.0.1' : HOST}:${MQTT_PORT}`;
}

function run(plans: readonly Plan[], speed: number): void {
  const log = logFor('simulator');
  const url = brokerUrl();
  const links: SensorLink[] = [];
  const floats = plans.map(({ entry, clockFrom, sendFrom }) => {
    const about = { sensor: entry.sensor, scenario: entry.scenario };
    // Settings may come before the float is made: then it takes them at its start.
    const held: { float?: RunningFloat; told?: SensorSettings } = {};
    const link = new SensorLink({
      url,
      onSettings: (settings) => {
        held.told = settings;
        held.float?.obey(settings);
      },
      sensor: entry.sensor,
      secret: entry.secret,
      onState: (state, detail) => log[state === 'refused' ? 'warn' : 'debug']({ ...about, detail }, `link ${state}`),
    });
    links.push(link);
    held.float = new RunningFloat(entry, link, new FastClock(systemClock, clockFrom, speed), sendFrom);
    if (held.told) held.float.obey(held.told);
    return held.float;
  });
  log.info({ sensors: floats.length, speed }, 'simulated floats at work');
  const timer = setInterval(() => floats.forEach((float) => float.tick()), TICK_MS);
  let stopping = false;
  const stop = async () => {
    if (stopping) return;
    stopping = true;
    clearInterval(timer);
    await Promise.all(links.map((link) => link.close(PATIENCE_MS)));
    const total = (count: (link: SensorLink) => number) => links.reduce((sum, link) => sum + count(link), 0);
    log.info({ acknowledged: total((link) => link.acknowledged), waiting: total((link) => link.waiting), overwritten: total((link) => link.overwritten) }, 'simulated floats stopped');
  };
  process.once('SIGINT', () => void stop());
  process.once('SIGTERM', () => void stop());
}

function main(argv: readonly string[]): void {
  const now = systemClock.now();
  const options = parseOptions(argv, now);
  if (options.help || options.list) {
    process.stdout.write(`${options.help ? USAGE : list()}\n`);
    return;
  }
  const listed = options.credentials ? null : readSensorsFile(join(env().DATA_DIR, SIMULATORS_FILE));
  run(plan(options, listed, now), options.speed);
}

try {
  main(process.argv.slice(2));
} catch (error) {
  if (!(error instanceof OptionError || error instanceof SensorsFileError || error instanceof EnvError)) throw error;
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 2;
}
