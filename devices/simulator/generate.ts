import type { BatchEvent, BatchSetup, Instant } from '@/lib/core/types';
import type { TelemetryReading } from '@/lib/contracts/telemetry';
import { Ferment, YEAST, type Truth, type YeastTruth } from './ferment';
import { between, normal, stream } from './random';
import { roomTemperature } from './room';
import type { Scenario } from './scenario';
import { FloatSensor, ordinaryTraits, type SensorTraits } from './sensor';

const HOUR = 3_600_000;
/** A home hydrometer is read to about this, points (sd). */
const HYDROMETER_POINTS = 0.5;
/** From the link's return to the backlog's arrival. */
const BACKLOG_MS = 2_000;

export interface SeriesOptions {
  seed: number;
  /** The pitch; the first reading is at it. */
  start: Instant;
  /** Minutes between readings, 15 unless told. */
  intervalMin?: number;
}

/** A reading as it is sent, when it gets there, and what was really the case. */
export interface SimulatedReading {
  /** By the sensor's clock, which may be wrong. */
  at: Instant;
  measuredAt: Instant;
  arrivesAt: Instant;
  body: TelemetryReading & { at: string };
  truth: Truth;
}

/** A line of the log; `text` says what was done. */
export interface SimulatedEvent extends BatchEvent {
  text: string;
}

export interface SimulatedBatch {
  scenario: Scenario;
  /** What the keeper knows, in the form that the analysis takes. */
  setup: BatchSetup;
  events: SimulatedEvent[];
  /** All measured up to the end, in that order; some arrive only after it. */
  readings: SimulatedReading[];
}

/** What differs from one pitch of the same scenario to the next. */
function drawn(scenario: Scenario, seed: number): { must: Scenario['must']; yeast: YeastTruth; traits: SensorTraits } {
  const draw = stream(seed, 'pitch');
  const about = (spread: number) => Math.exp(spread * Math.max(-2, Math.min(2, normal(draw))));
  const yeast = { ...YEAST, ...scenario.yeast };
  return {
    must: {
      gravity: scenario.must.gravity + 0.0006 * normal(draw),
      dryGravity: scenario.must.dryGravity + 0.0005 * normal(draw),
      nitrogen: scenario.must.nitrogen * about(0.04),
    },
    yeast: { ...yeast, betaMax: yeast.betaMax * about(0.05), lagH: yeast.lagH * about(0.08) },
    traits: { ...ordinaryTraits(seed), ...scenario.sensor },
  };
}

function fermentOf(scenario: Scenario, { seed, start }: SeriesOptions): Ferment {
  const { must, yeast } = drawn(scenario, seed);
  const room = roomTemperature(scenario.room.steps, scenario.room.dayNightC, start, seed);
  return new Ferment(must, yeast, scenario.volumeL, room, scenario.events);
}

/** Whole seconds, with a zone, as a small device writes it. */
const stamp = (at: Instant) => new Date(at).toISOString().replace('.000Z', 'Z');

/**
 * The sensor's readings from the pitch on, without end unless its cell goes flat.
 * A reading depends on the scenario, the seed, the start and the interval, and on
 * nothing else: whoever goes through them again gets the same.
 */
export function* series(scenario: Scenario, options: SeriesOptions): Generator<SimulatedReading, void> {
  const { seed, start, intervalMin = 15 } = options;
  const { traits } = drawn(scenario, seed);
  const ferment = fermentOf(scenario, options);
  const moves = scenario.events.flatMap((event) => (event.floatPoints ? [{ atH: event.atH, points: event.floatPoints }] : []));
  const sensor = new FloatSensor(traits, seed, scenario.volumeL, moves);
  const draw = stream(seed, 'link');
  let lastH = -intervalMin / 60;
  for (let sequence = 0; ; sequence += 1) {
    const late = between(draw, 0, 9_000);
    const travel = between(draw, 500, 5_000);
    const lost = draw() < traits.lostShare;
    const measuredAt = Math.floor((start + sequence * intervalMin * 60_000 + late) / 1000) * 1000;
    const hours = Math.max(0, (measuredAt - start) / HOUR);
    if (traits.flatAtH !== null && hours >= traits.flatAtH) return;
    const truth = ferment.at(hours);
    const measured = sensor.measure(hours, hours - lastH, truth);
    lastH = hours;
    const gap = traits.gaps.find(({ fromH, toH }) => hours >= fromH && hours < toH);
    if (lost || gap?.kept === false) continue;
    const at = measuredAt + traits.clockHours * HOUR;
    yield {
      at,
      measuredAt,
      // A backlog comes in one go, in the order in which it was kept.
      arrivesAt: gap ? start + gap.toH * HOUR + BACKLOG_MS : Math.round(measuredAt + travel),
      body: { at: stamp(at), ...measured, sequence },
      truth,
    };
  }
}

/** What was logged up to a time, hydrometer readings included. */
function loggedEvents(scenario: Scenario, options: SeriesOptions, end: Instant): SimulatedEvent[] {
  const ferment = fermentOf(scenario, options);
  const draw = stream(options.seed, 'hydrometer');
  const events: SimulatedEvent[] = [];
  for (const event of [...scenario.events].sort((one, other) => one.atH - other.atH)) {
    const at = options.start + event.atH * HOUR;
    if (at > end) break;
    const gravity = event.kind === 'reading' ? hydrometer(ferment.at(event.atH).gravity, draw) : event.gravity;
    if (event.text === null) continue;
    const { sugarG, fruitG, volumeL, neck } = event;
    const told = { sugarG, fruitG, volumeL, gravity, neck };
    events.push({ at, kind: event.kind, text: event.text, ...Object.fromEntries(Object.entries(told).filter(([, value]) => value !== undefined)) });
  }
  return events;
}

const hydrometer = (gravity: number, draw: () => number) => Number((gravity + (HYDROMETER_POINTS / 1000) * normal(draw)).toFixed(3));

/** What the keeper wrote down at the pitch. */
export function setupOf(scenario: Scenario, { seed, start }: SeriesOptions): Omit<BatchSetup, 'events'> {
  return {
    kind: scenario.kind,
    pitchedAt: start,
    originalGravity: hydrometer(drawn(scenario, seed).must.gravity, stream(seed, 'original gravity')),
    volumeL: scenario.volumeL,
    vesselL: scenario.vessel.litres,
    attenuation: scenario.packet.attenuation,
    alcoholToleranceAbv: scenario.packet.toleranceAbv,
    temperature: scenario.packet.temperature,
    neck: scenario.neck,
  };
}

/** A whole batch from its pitch to `end`: set-up, log and readings, the same every time for the same arguments. */
export function generate(scenario: Scenario, options: SeriesOptions & { end: Instant }): SimulatedBatch {
  const readings: SimulatedReading[] = [];
  for (const reading of series(scenario, options)) {
    if (reading.measuredAt > options.end) break;
    readings.push(reading);
  }
  const events = loggedEvents(scenario, options, options.end);
  return { scenario, setup: { ...setupOf(scenario, options), events }, events, readings };
}

/** The same readings in the order in which they get there: what a broken link held back comes later. */
export function* byArrival(readings: Iterable<SimulatedReading>): Generator<SimulatedReading, void> {
  let held: SimulatedReading[] = [];
  const release = function* (until: Instant) {
    const due = held.filter((reading) => reading.arrivesAt <= until).sort((one, other) => one.arrivesAt - other.arrivesAt);
    if (due.length > 0) held = held.filter((reading) => reading.arrivesAt > until);
    yield* due;
  };
  for (const reading of readings) {
    yield* release(reading.measuredAt);
    held.push(reading);
  }
  yield* release(Infinity);
}
