import { isUtf8 } from 'node:buffer';
import type { Measured } from '@/db/queries/record-readings';
import { EARLIEST_MS, MAX_AHEAD_MS, MAX_READINGS_PER_MESSAGE, REFUSED_BODY_BYTES, foamReading, reading, roomReading, type TelemetryReading } from '@/lib/contracts/telemetry';
import { looksLikeSenml, readSenml } from './senml';

/** What could not be stored: the place in the message, why, and the first bytes of it. */
export interface Refused {
  index: number;
  reason: string;
  body: Buffer;
}

export interface ParsedMessage {
  /** May be stored. */
  accepted: Measured[];
  refused: Refused[];
  /** The settings that the latest of them says are in force; null: they say nothing of it. */
  settings: number | null;
}

export type SensorKind = 'float' | 'room' | 'foam' | 'file';
const READING_OF = { float: reading, file: reading, room: roomReading, foam: foamReading } as const;

export type BodyForm = 'json' | 'senml' | 'unknown';

/**
 * Reads the body of one message. Each reading is checked by itself: one that is
 * wrong is refused alone, with its reason, and the others are taken.
 * @param arrivedAt ms since 1970; the time of a reading that names none.
 * @param kind decides what has to be in it: a float's gravity or inclination, a foam probe's foam
 * @param form what the sender said the body is; `unknown` goes by its shape.
 */
export function parseMessage(body: Buffer, arrivedAt: number, form: BodyForm = 'unknown', kind: SensorKind = 'float'): ParsedMessage {
  if (body.length === 0) return whole(body, 'the message is empty');
  if (!isUtf8(body)) return whole(body, 'the message is not UTF-8 text');
  let value: unknown;
  try {
    value = JSON.parse(body.toString('utf8'));
  } catch {
    return whole(body, 'the message is not JSON');
  }
  if (typeof value !== 'object' || value === null) return whole(body, 'the message must be a JSON object or an array of them');
  const items: unknown[] = Array.isArray(value) ? value : [value];
  if (items.length === 0) return whole(body, 'the message holds no reading');

  const senml = form === 'senml' || (form === 'unknown' && looksLikeSenml(value));
  const limit = senml ? MAX_READINGS_PER_MESSAGE * 3 : MAX_READINGS_PER_MESSAGE;
  if (items.length > limit) return whole(body, `the message holds ${items.length} ${senml ? 'records' : 'readings'}; at most ${limit} go in one`);
  return senml ? fromSenml(items, arrivedAt, body, kind) : fromReadings(items, arrivedAt, kind);
}

function fromReadings(items: unknown[], arrivedAt: number, kind: SensorKind): ParsedMessage {
  const parsed: ParsedMessage = { accepted: [], refused: [], settings: null };
  items.forEach((item, index) => take(parsed, item, index, arrivedAt, kind));
  return parsed;
}

function take(parsed: ParsedMessage, item: unknown, index: number, arrivedAt: number, kind: SensorKind): void {
  const checked = check(item, arrivedAt, kind);
  if (typeof checked === 'string') parsed.refused.push({ index, reason: checked, body: excerpt(item) });
  else {
    parsed.accepted.push(checked.measured);
    parsed.settings = checked.settings ?? parsed.settings;
  }
}

function fromSenml(items: unknown[], arrivedAt: number, body: Buffer, kind: SensorKind): ParsedMessage {
  const { readings, problems } = readSenml(items, arrivedAt);
  if (readings.length === 0 && problems.length === 0) return whole(body, 'the SenML pack holds no density, temperature or voltage');
  const parsed: ParsedMessage = { accepted: [], refused: problems.map((problem) => ({ ...problem, body: excerpt(items[problem.index]) })), settings: null };
  for (const { reading: item, index } of readings) take(parsed, item, index, arrivedAt, kind);
  return parsed;
}

/** The reading in its stored form, or the reason why not. */
function check(item: unknown, arrivedAt: number, kind: SensorKind): { measured: Measured; settings: number | undefined } | string {
  const result = READING_OF[kind].safeParse(item);
  if (!result.success) return reasonOf(result.error.issues[0]);
  const value: TelemetryReading = result.data;
  const measuredAt = value.at === undefined ? arrivedAt : Date.parse(value.at);
  if (measuredAt > arrivedAt + MAX_AHEAD_MS) return `at is more than ${MAX_AHEAD_MS / 60_000} min ahead of the server's clock: the sensor's clock is wrong`;
  if (measuredAt < EARLIEST_MS) return 'at is before 2015: the clock of the sensor was never set';
  // A probe that hangs in no drink has no gravity to tell, whatever it sends.
  const floats = kind === 'float' || kind === 'file';
  const measured: Measured = {
    measuredAt,
    gravity: floats ? (value.gravity ?? null) : null,
    temperature: single(value.temperature),
    battery: singleOrNull(value.battery),
    signal: singleOrNull(value.signal),
    inclination: floats ? singleOrNull(value.inclination) : null,
    foam: singleOrNull(value.foam),
    sequence: value.sequence ?? null,
  };
  return { measured, settings: value.settings };
}

/** As PostgreSQL's `real` keeps it; its parser refuses a number too small for one, which here becomes zero. */
const single = (value: number) => Math.fround(value) + 0;
const singleOrNull = (value: number | undefined) => (value === undefined ? null : single(value));

function reasonOf(issue: { path: PropertyKey[]; message: string } | undefined): string {
  if (!issue) return 'is not a reading';
  const field = issue.path.join('.');
  if (!field) return 'a reading must be a JSON object';
  return issue.message.startsWith(field) ? issue.message : `${field} ${issue.message}`;
}

/** Nothing of the message is taken. What is kept of it is a copy: its own buffer is part of a larger one. */
function whole(body: Buffer, reason: string): ParsedMessage {
  return { accepted: [], refused: [{ index: 0, reason, body: Buffer.from(body.subarray(0, REFUSED_BODY_BYTES)) }], settings: null };
}

function excerpt(item: unknown): Buffer {
  let text: string | undefined;
  try {
    text = JSON.stringify(item);
  } catch {
    // Nested so deeply that writing it out overflows the stack; it was parsed without one.
    text = undefined;
  }
  return Buffer.from(text ?? '(cannot be shown)').subarray(0, REFUSED_BODY_BYTES);
}
