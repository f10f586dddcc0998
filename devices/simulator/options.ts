import { parseArgs } from 'node:util';
import type { Instant } from '@/lib/core/types';
import { scenarioNamed } from './scenarios';
import type { SimulatedSensor } from './sensors-file';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
/** A restarted float sends what it measured in this time again; what is stored counts once. */
const REPEATED = 14 * DAY;
const FASTEST = 100_000;

export const USAGE = `npm run simulate -- [--scenario NAME] [--speed N] [--seed N] [--list]
                       [--sensor ID --secret SECRET] [--from TIME] [--interval MINUTES]

Without --scenario: the demo's sensors, as DATA_DIR/simulators.json lists them.
  --speed N      a clock N times as fast, from --from until it has caught up with now
  --from TIME    RFC 3339 with a zone, or so long ago: 20d, 36h. At speed 1 all since then is sent at once
  --list         the scenarios and what they show`;

/** A wrong command line, said in one sentence. */
export class OptionError extends Error {
  override name = 'OptionError';
}

export interface Options {
  list: boolean;
  help: boolean;
  speed: number;
  scenario: string | null;
  seed: number | null;
  from: Instant | null;
  intervalMin: number | null;
  credentials: { sensor: string; secret: string } | null;
}

/** @throws OptionError */
export function parseOptions(argv: readonly string[], now: Instant): Options {
  const { values } = parsed(argv);
  if ((values.sensor === undefined) !== (values.secret === undefined)) throw new OptionError('--sensor and --secret go together.');
  const credentials = values.sensor !== undefined && values.secret !== undefined ? { sensor: values.sensor, secret: values.secret } : null;
  if (credentials && !values.scenario) throw new OptionError('--sensor needs a --scenario to play; --list shows them.');
  return {
    list: values.list,
    help: values.help,
    speed: numberWithin('speed', values.speed, 1, FASTEST) ?? 1,
    scenario: values.scenario === undefined ? null : known(values.scenario),
    seed: wholeNumber('seed', values.seed),
    from: values.from === undefined ? null : timeOf(values.from, now),
    intervalMin: numberWithin('interval', values.interval, 1 / 6, 1440),
    credentials,
  };
}

function parsed(argv: readonly string[]) {
  try {
    return parseArgs({
      args: [...argv],
      options: {
        scenario: { type: 'string' },
        speed: { type: 'string' },
        seed: { type: 'string' },
        list: { type: 'boolean', default: false },
        help: { type: 'boolean', default: false },
        sensor: { type: 'string' },
        secret: { type: 'string' },
        from: { type: 'string' },
        interval: { type: 'string' },
      },
    });
  } catch (error) {
    throw new OptionError(error instanceof Error ? error.message : String(error));
  }
}

function known(name: string): string {
  try {
    return scenarioNamed(name).name;
  } catch (error) {
    throw new OptionError(error instanceof Error ? error.message : String(error));
  }
}

function numberWithin(name: string, text: string | undefined, low: number, high: number): number | null {
  if (text === undefined) return null;
  const value = Number(text);
  if (text.trim() === '' || !(value >= low && value <= high)) throw new OptionError(`--${name} must be a number from ${Number(low.toFixed(2))} to ${high}, not "${text}".`);
  return value;
}

function wholeNumber(name: string, text: string | undefined): number | null {
  const value = numberWithin(name, text, 0, Number.MAX_SAFE_INTEGER);
  if (value !== null && !Number.isInteger(value)) throw new OptionError(`--${name} must be a whole number, not "${text}".`);
  return value;
}

function timeOf(text: string, now: Instant): Instant {
  const ago = /^(\d+(?:\.\d+)?)([dh])(?: ago)?$/.exec(text.trim());
  const at = ago ? now - Number(ago[1]) * (ago[2] === 'd' ? DAY : HOUR) : /T.*(Z|[+-]\d\d:\d\d)$/.test(text) ? Date.parse(text) : NaN;
  if (!Number.isFinite(at)) throw new OptionError(`--from must be a time with a zone such as 2026-03-04T06:00:00Z, or so long ago such as 20d, not "${text}".`);
  if (at > now) throw new OptionError('--from must not lie in the future.');
  return at;
}

/** A sensor to run, and from when: where its clock starts, and the first arrival to send. */
export interface Plan {
  entry: SimulatedSensor;
  clockFrom: Instant;
  sendFrom: Instant;
}

/**
 * What to run. With credentials: that one sensor, its ferment pitched at --from.
 * Else the listed sensors, or those of the scenario named.
 * @throws OptionError when there is nothing to run.
 */
export function plan(options: Options, listed: readonly SimulatedSensor[] | null, now: Instant): Plan[] {
  const fast = options.speed > 1;
  const { scenario, credentials } = options;
  if (scenario && credentials) {
    const pitched = options.from ?? (fast ? now - scenarioNamed(scenario).ageH * HOUR : now);
    const start = Math.floor(pitched / 1000) * 1000;
    const entry = { ...credentials, scenario, seed: options.seed ?? 1, startedAt: new Date(start).toISOString(), interval_s: (options.intervalMin ?? 15) * 60 };
    return [{ entry, clockFrom: fast ? start : now, sendFrom: start }];
  }
  const chosen = (listed ?? []).filter((entry) => scenario === null || entry.scenario === scenario);
  if (chosen.length === 0) {
    const what = scenario ? `No sensor of the demo plays "${scenario}"` : 'There are no simulated sensors yet';
    throw new OptionError(`${what}. Start the demo first, or make a sensor and give --scenario, --sensor and --secret.`);
  }
  return chosen.map((entry) => {
    const started = Date.parse(entry.startedAt);
    const sendFrom = Math.max(started, options.from ?? (fast ? started : now - REPEATED));
    const interval_s = options.intervalMin === null ? entry.interval_s : options.intervalMin * 60;
    return { entry: { ...entry, seed: options.seed ?? entry.seed, interval_s }, clockFrom: fast ? sendFrom : now, sendFrom };
  });
}
