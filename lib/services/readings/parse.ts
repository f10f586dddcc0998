import { isUtf8 } from 'node:buffer';
import type { Measured } from '@/db/queries/record-readings';
import { EARLIEST_MS, MAX_AHEAD_MS, MAX_READINGS_PER_MESSAGE, REFUSED_BODY_BYTES, reading, type TelemetryReading } from '@/lib/contracts/telemetry';
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
}

export type BodyForm = 'json' | 'senml' | 'unknown';

/**
 * Reads the body of one message. Each reading is checked by itself: one that is
 * wrong is refused alone, with its reason, and the others are taken.
 * @param arrivedAt ms since 1970; the time of a reading that names none.
 * @param form what the sender said the body is; `unknown` goes by its shape.
 */
export function parseMessage(body: Buffer, arrivedAt: number, form: BodyForm = 'unknown'): ParsedMessage {
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
  return senml ? fromSenml(items, arrivedAt, body) : fromReadings(items, arrivedAt);
}

function fromReadings(items: unknown[], arrivedAt: number): ParsedMessage {
  const parsed: ParsedMessage = { accepted: [], refused: [] };
  items.forEach((item, index) => {
    const checked = check(item, arrivedAt);
    if (typeof checked === 'string') parsed.refused.push({ index, reason: checked, body: excerpt(item) });
    else parsed.accepted.push(checked);
  });
  return parsed;
}

function fromSenml(items: unknown[], arrivedAt: number, body: Buffer): ParsedMessage {
  const { readings, problems } = readSenml(items, arrivedAt);
  if (readings.length === 0 && problems.length === 0) return whole(body, 'the SenML pack holds no density, temperature or voltage');
  const parsed: ParsedMessage = { accepted: [], refused: problems.map((problem) => ({ ...problem, body: excerpt(items[problem.index]) })) };
  for (const { reading: item, index } of readings) {
    const checked = check(item, arrivedAt);
    if (typeof checked === 'string') parsed.refused.push({ index, reason: checked, body: excerpt(item) });
    else parsed.accepted.push(checked);
  }
  return parsed;
}

/** The reading in its stored form, or the reason why not. */
function check(item: unknown, arrivedAt: number): Measured | string {
  const result = reading.safeParse(item);
  if (!result.success) return reasonOf(result.error.issues[0]);
  const value: TelemetryReading = result.data;
  const measuredAt = value.at === undefined ? arrivedAt : Date.parse(value.at);
  if (measuredAt > arrivedAt + MAX_AHEAD_MS) return `at is more than ${MAX_AHEAD_MS / 60_000} min ahead of the server's clock: the sensor's clock is wrong`;
  if (measuredAt < EARLIEST_MS) return 'at is before 2015: the clock of the sensor was never set';
  return {
    measuredAt,
    gravity: value.gravity ?? null,
    temperature: single(value.temperature),
    battery: singleOrNull(value.battery),
    signal: singleOrNull(value.signal),
    inclination: singleOrNull(value.inclination),
    foam: singleOrNull(value.foam),
    sequence: value.sequence ?? null,
  };
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
  return { accepted: [], refused: [{ index: 0, reason, body: Buffer.from(body.subarray(0, REFUSED_BODY_BYTES)) }] };
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
