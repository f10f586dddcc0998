import { z } from 'zod';
import { timestamp } from './common';
import { CALL_NAMES, NECKS, STAGES, VERDICTS, type Assessment, type Call, type Estimate, type Footing, type Instant, type Judgement, type WideEstimate } from '../core/types';

const estimate = z.object({ value: z.number(), lo: z.number(), hi: z.number() });
const instantEstimate = z.object({ value: z.string(), lo: z.string(), hi: z.string() });

export const callSchema = z.object({
  verdict: z.enum(VERDICTS),
  kind: z.string().nullable(),
  since: z.string().nullable(),
  expected_at: z.string().nullable(),
  headline: z.string(),
  reason: z.string(),
  act: z.string().nullable(),
  changes_it: z.string().nullable(),
  evidence: z.array(z.object({ name: z.string(), value: z.number(), threshold: z.number().nullable(), unit: z.string() })),
});
export type CallBody = z.infer<typeof callSchema>;

/** The assessment as the outside sees it. */
export const assessmentSchema = z.object({
  at: z.string(),
  stage: z.enum(STAGES),
  gravity: estimate.nullable(),
  /** Where it was last known to stand; judgements kept from before it was told are without. */
  last_gravity: z.object({ at: z.string(), value: z.number() }).nullable().optional(),
  temperature_c: z.number().nullable(),
  last_reading_at: z.string().nullable(),
  rate_points_per_day: estimate.nullable(),
  gas_l_per_h: estimate.nullable(),
  final_gravity: estimate.extend({ lo95: z.number(), hi95: z.number() }).nullable(),
  terminal_at: instantEstimate.nullable(),
  abv_percent: z.object({ value: z.number() }).nullable(),
  expected_abv_percent: z.object({ value: z.number() }).nullable(),
  attenuation_percent: z.number().nullable(),
  calls: z.record(z.enum(CALL_NAMES), callSchema),
});
export type AssessmentBody = z.infer<typeof assessmentSchema>;

export const curvePointSchema = z.object({ at: z.string(), gravity: z.number(), lo: z.number(), hi: z.number() });

/** What the forecast stands on, in the core's own words and units (`at` in ms since 1970, gravities in points): what is played with on the page. */
export const footingSchema = z.object({
  at: z.number(),
  hour: z.number(),
  from: z.number(),
  effectiveOg: z.number(),
  level: z.number(),
  finalGravity: z.object({ value: z.number(), half80: z.number() }),
  tau: z.number(),
  warmth: z.number(),
  temperatureC: z.number().nullable(),
  done: z.number(),
  hoursToEnd: z.number().nullable(),
  ratePointsPerDay: z.number().nullable(),
  state: z.enum(['falling', 'stuck', 'terminal']),
  maxRate: z.number(),
  peaked: z.boolean(),
  neck: z.enum(NECKS).nullable(),
  parameters: z.array(z.number()).readonly(),
  prior: z.array(z.object({ mean: z.number(), sd: z.number() })).readonly(),
  data: z.object({ hours: z.array(z.number()).readonly(), tau: z.array(z.number()).readonly(), points: z.array(z.number()).readonly(), sd: z.array(z.number()).readonly() }),
}) satisfies z.ZodType<Footing>;

const drawnSchema = assessmentSchema.extend({
  curve: z.array(curvePointSchema),
  expected: z.array(curvePointSchema),
  gas: z.array(z.object({ at: z.string(), value: z.number() })),
  /** Null where nothing can be fitted yet. */
  footing: footingSchema.nullable(),
});
/** The assessment with what a picture of it needs. */
export type Drawn = z.infer<typeof drawnSchema>;

export const judgementSchema = drawnSchema.extend({
  /** Something was logged or changed since: a newer judgement is on its way, ask again in a second. */
  pending: z.boolean(),
});
export type JudgementBody = z.infer<typeof judgementSchema>;

const iso = (at: Instant) => new Date(Math.round(at)).toISOString();
const isoOrNull = (at: Instant | null) => (at === null ? null : iso(at));
const rounded = (value: number, digits: number) => Number(value.toFixed(digits));

function presentEstimate(value: Estimate | null, digits: number) {
  return value && { value: rounded(value.value, digits), lo: rounded(value.lo, digits), hi: rounded(value.hi, digits) };
}

function presentWide(value: WideEstimate | null, digits: number) {
  return value && { ...presentEstimate(value, digits)!, lo95: rounded(value.lo95, digits), hi95: rounded(value.hi95, digits) };
}

/** The wire form of one call. */
export function presentCall(call: Call): CallBody {
  return {
    verdict: call.verdict,
    kind: call.kind,
    since: isoOrNull(call.since),
    expected_at: isoOrNull(call.expectedAt),
    headline: call.headline,
    reason: call.reason,
    act: call.act,
    changes_it: call.changesIt,
    evidence: call.evidence.map((item) => ({ ...item })),
  };
}

/** The wire form of an assessment. Rounding is finer than any sensor, so that nothing is lost. */
export function presentAssessment(assessment: Assessment): AssessmentBody {
  const calls = Object.fromEntries(CALL_NAMES.map((name) => [name, presentCall(assessment.calls[name])])) as AssessmentBody['calls'];
  return {
    at: iso(assessment.at),
    stage: assessment.stage,
    gravity: presentEstimate(assessment.gravity, 5),
    last_gravity: assessment.lastGravity && { at: iso(assessment.lastGravity.at), value: rounded(assessment.lastGravity.value, 5) },
    temperature_c: assessment.temperatureC === null ? null : rounded(assessment.temperatureC, 2),
    last_reading_at: isoOrNull(assessment.lastReadingAt),
    rate_points_per_day: presentEstimate(assessment.ratePointsPerDay, 3),
    gas_l_per_h: presentEstimate(assessment.gasLPerH, 4),
    final_gravity: presentWide(assessment.finalGravity, 5),
    terminal_at: assessment.terminalAt && { value: iso(assessment.terminalAt.value), lo: iso(assessment.terminalAt.lo), hi: iso(assessment.terminalAt.hi) },
    abv_percent: assessment.abvPercent === null ? null : { value: rounded(assessment.abvPercent, 2) },
    expected_abv_percent: assessment.expectedAbvPercent === null ? null : { value: rounded(assessment.expectedAbvPercent, 2) },
    attenuation_percent: assessment.attenuationPercent === null ? null : rounded(assessment.attenuationPercent, 2),
    calls,
  };
}

/** The wire form of a judgement. */
export function presentJudgement(judgement: Judgement): Drawn {
  const point = (item: { at: Instant; gravity: number; lo: number; hi: number }) => ({
    at: iso(item.at),
    gravity: rounded(item.gravity, 5),
    lo: rounded(item.lo, 5),
    hi: rounded(item.hi, 5),
  });
  return {
    ...presentAssessment(judgement.assessment),
    curve: judgement.curve.map(point),
    expected: judgement.expected.map(point),
    gas: judgement.gas.map((item) => ({ at: iso(item.at), value: rounded(item.value, 4) })),
    footing: judgement.footing,
  };
}

/** `GET /api/v1/batches/{id}/assessment[?at=]`. */
export const assessmentQuery = z.object({ at: timestamp.optional() });

/** `GET /api/v1/batches/{id}/assessments`: the past verdicts, newest first, each kept when it changed. */
export const verdictChangeList = z.object({
  items: z.array(z.object({ at: z.string(), changed: z.array(z.enum(CALL_NAMES)), assessment: assessmentSchema })),
  next_cursor: z.string().nullable(),
});
export type VerdictChangeList = z.infer<typeof verdictChangeList>;
