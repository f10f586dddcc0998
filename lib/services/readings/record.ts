import { database } from '@/db/client';
import { ensurePartitions, monthOf, type Month } from '@/db/queries/partitions';
import { recordReadings, type ReadingRow, type RefusalRow } from '@/db/queries/record-readings';
import { isAboutTheRows, isMissingPartition } from '@/db/sqlstate';
import type { SensorIdentity } from '@/lib/auth/sensors';
import { systemClock } from '@/lib/clock';
import { REFUSED_BODY_BYTES } from '@/lib/contracts/telemetry';
import { confirmSettings, type Confirmation, type SensorNotes } from '@/db/queries/sensor-book';
import type { Announcer } from './announcer';
import { parseMessage, type BodyForm, type ParsedMessage, type Refused } from './parse';
import { calibrated, notesOf } from './sensor-book';

/** A message as it came in, by whichever door. */
export interface Message {
  /** Who sent it; null where the name on it is nobody's that we know. */
  sensor: SensorIdentity | null;
  road: 'mqtt' | 'http';
  body: Buffer;
  form?: BodyForm;
  /** ms since 1970. */
  arrivedAt: number;
  /** Set where the message as a whole may not count; its body is then not read. */
  refusedBecause?: string;
}

export interface Recorded {
  /** Readings that were new. */
  stored: number;
  /** Readings that were there already. */
  duplicates: number;
  /** What was refused, message by message. */
  refused: Refused[][];
}

/**
 * Takes in a batch of messages: what is right becomes readings, what is not is
 * kept with its reason, and when the promise fulfils all of it is committed. It
 * rejects only where the database cannot do it now; then nothing was written and
 * the same batch may be given again.
 */
export async function recordMessages(messages: readonly Message[], announcer?: Announcer): Promise<Recorded> {
  const sensors = messages.flatMap((message) => (message.sensor ? [message.sensor.id] : []));
  const notes = await notesOf(sensors, systemClock.now());
  const parsed = messages.map((message) => parse(message, message.sensor && notes.get(message.sensor.id)));
  const readings: ReadingRow[] = [];
  const refusals: RefusalRow[] = [];
  messages.forEach((message, index) => {
    const { accepted, refused } = parsed[index]!;
    const calibrations = (message.sensor && notes.get(message.sensor.id)?.calibrations) ?? [];
    for (const sent of accepted) {
      const { gravity, calibrationId, gravitySent } = calibrated(calibrations, sent.measuredAt, sent);
      readings.push({ sensorId: message.sensor!.id, receivedAt: message.arrivedAt, reading: gravity === sent.gravity ? sent : { ...sent, gravity }, calibrationId, gravitySent });
    }
    for (const { reason, body } of refused) refusals.push({ sensorId: message.sensor?.id ?? null, receivedAt: message.arrivedAt, road: message.road, reason, body });
  });

  try {
    const stored = await write(readings, refusals, messages, announcer);
    const confirmations = confirmedBy(messages, parsed, notes);
    if (confirmations.length > 0) await confirmSettings(confirmations);
    return { stored, duplicates: readings.length - stored, refused: parsed.map((message) => message.refused) };
  } catch (error) {
    if (!isAboutTheRows(error)) throw error;
    return oneByOne(messages, error, announcer);
  }
}

function parse(message: Message, notes: SensorNotes | null | undefined): ParsedMessage {
  const because = message.refusedBecause ?? (message.sensor ? undefined : 'no sensor has this name');
  if (because) return { accepted: [], refused: [{ index: 0, reason: because, body: Buffer.from(message.body.subarray(0, REFUSED_BODY_BYTES)) }], settings: null };
  return parseMessage(message.body, message.arrivedAt, message.form, notes?.kind);
}

/** What sensors newly say of their settings. */
function confirmedBy(messages: readonly Message[], parsed: readonly ParsedMessage[], notes: ReadonlyMap<number, SensorNotes>): Confirmation[] {
  const latest = new Map<number, Confirmation>();
  messages.forEach(({ sensor, arrivedAt }, index) => {
    const version = parsed[index]?.settings ?? null;
    if (!sensor || version === null || version === notes.get(sensor.id)?.confirmedVersion) return;
    if (version > (latest.get(sensor.id)?.version ?? -1)) latest.set(sensor.id, { sensorId: sensor.id, version, at: arrivedAt });
  });
  return [...latest.values()];
}

/** One message that the database cannot take must not hold up the others: halve until it stands alone, then keep it as refused. */
async function oneByOne(messages: readonly Message[], error: unknown, announcer?: Announcer): Promise<Recorded> {
  const [only] = messages;
  if (messages.length === 1 && only) {
    if (only.refusedBecause) throw error;
    return recordMessages([{ ...only, refusedBecause: 'the database could not store it' }], announcer);
  }
  const middle = Math.ceil(messages.length / 2);
  const first = await recordMessages(messages.slice(0, middle), announcer);
  const second = await recordMessages(messages.slice(middle), announcer);
  return { stored: first.stored + second.stored, duplicates: first.duplicates + second.duplicates, refused: [...first.refused, ...second.refused] };
}

/** Months whose partition was seen; forgotten when the database says that one is missing. */
const monthsSeen = new Set<Month>();

async function write(readings: ReadingRow[], refusals: RefusalRow[], messages: readonly Message[], announcer?: Announcer): Promise<number> {
  const sequelize = database();
  const now = messages.at(-1)?.arrivedAt ?? 0;
  const tell = announcer ? announcer.due(readings, now) : [...new Set(readings.map((row) => row.sensorId))];
  const months = new Set(readings.map((row) => monthOf(row.reading.measuredAt)));
  for (let attempt = 0; ; attempt += 1) {
    const unseen = [...months].filter((month) => !monthsSeen.has(month));
    if (unseen.length > 0) {
      await ensurePartitions(sequelize, unseen);
      for (const month of unseen) monthsSeen.add(month);
    }
    try {
      const stored = await recordReadings(sequelize, readings, refusals, tell);
      announcer?.stored(readings, tell, now);
      return stored;
    } catch (error) {
      if (attempt > 0 || !isMissingPartition(error)) throw error;
      monthsSeen.clear();
    }
  }
}
