import { z } from 'zod';
import { LONGEST_SPAN_MIN, RULE_NAMES } from '../core/alerts/rules';
import { MEANS } from '../core/alerts/telling';
import { CALL_NAMES } from '../core/types';
import { ALERT_LEVELS, ALERT_STATES, alertSchema } from './alerts';
import { id, timestamp } from './common';

const minuteOfDay = z.number('must be a time').int('must be a time').min(0, 'must be a time of the day').max(1439, 'must be a time of the day');
const spanMin = z.number('must be a number of minutes').int('must be whole minutes').min(0, 'must not be negative').max(LONGEST_SPAN_MIN, 'must be at most two days').nullable();
const person = z.object({ id, name: z.string() });

/** Minutes after midnight on the person's own clock; over midnight where `from` is the later. */
const quietHours = z.object({ from: minuteOfDay, to: minuteOfDay }).refine(({ from, to }) => from !== to, { path: ['to'], message: 'must be another time than the beginning' });

export const muteSchema = z.object({
  id,
  batch: z.object({ id, name: z.string() }),
  /** Null: they have left. */
  by: person.nullable(),
  from: z.string(),
  until: z.string(),
});
export type MuteBody = z.infer<typeof muteSchema>;
export const muteList = z.object({ items: z.array(muteSchema) });
/** `POST /api/v1/batches/{id}/mutes`. */
export const createMute = z.object({ until: timestamp });

/** A rule as it holds here, with its spans in sentences. */
const ruleSchema = z.object({
  rule: z.enum(RULE_NAMES),
  level: z.enum(ALERT_LEVELS),
  enabled: z.boolean(),
  begins: z.string(),
  ends: z.string(),
  for_min: z.number(),
  keep_min: z.number(),
  /** Whether somebody set them otherwise than usual. */
  changed: z.boolean(),
});

/** `GET /api/v1/messages`: all that decides who is told of what, when, and by which means. */
export const messagesSchema = z.object({
  time_zone: z.string(),
  quiet: z.object({ from: z.number(), to: z.number() }).nullable(),
  /** When the morning digest comes, minutes after midnight; null: it does not. */
  digest_at: z.number().nullable(),
  /** The person's own choices, every rule and means. */
  choices: z.array(z.object({ rule: z.enum(RULE_NAMES), means: z.enum(MEANS), wanted: z.boolean() })),
  devices: z.array(z.object({ id, user_agent: z.string(), created_at: z.string(), last_taken_at: z.string().nullable(), last_error: z.string().nullable(), this_sign_in: z.boolean() })),
  /** The key that a browser asks for before it takes messages of this house. */
  push_key: z.string(),
  rules: z.array(ruleSchema),
  /** Rules set otherwise for one vessel. */
  exceptions: z.array(ruleSchema.extend({ batch: z.object({ id, name: z.string() }) })),
  /** Who waits for whom; everybody else is told at once. */
  escalation: z.object({ after_min: z.number(), people: z.array(person) }),
  /** Who can be told here. */
  people: z.array(person),
  mutes: z.array(muteSchema),
});
export type MessagesBody = z.infer<typeof messagesSchema>;

/** `PATCH /api/v1/messages`: the person's own; what is left out stays. */
export const updateMessages = z.object({
  quiet: quietHours.nullable().optional(),
  digest_at: minuteOfDay.nullable().optional(),
  choices: z.array(z.object({ rule: z.enum(RULE_NAMES), means: z.enum(MEANS), wanted: z.boolean() })).max(RULE_NAMES.length * MEANS.length).optional(),
});
export type UpdateMessages = z.infer<typeof updateMessages>;

/** `PATCH /api/v1/messages/rules`: a rule for the cellar, or for one batch of it. */
export const updateRule = z.object({
  rule: z.enum(RULE_NAMES),
  batch_id: id.nullable().default(null),
  /** Everything as usual again; what else is said does not count. */
  usual: z.boolean().default(false),
  enabled: z.boolean().default(true),
  for_min: spanMin.default(null),
  keep_min: spanMin.default(null),
});
export type UpdateRule = z.infer<typeof updateRule>;

/** `PATCH /api/v1/messages/escalation`. */
export const updateEscalation = z.object({
  after_min: z.number('must be a number of minutes').int('must be whole minutes').min(5, 'must be at least 5 min').max(1440, 'must be at most a day'),
  people: z.array(id).max(50).refine((people) => new Set(people).size === people.length, 'names somebody twice'),
});
export type UpdateEscalation = z.infer<typeof updateEscalation>;

const base64url = (most: number) => z.string().max(most).regex(/^[A-Za-z0-9_-]+={0,2}$/, 'is not a key');

/** `POST /api/v1/devices`: what a browser's push subscription holds (W3C Push API). */
export const createDevice = z.object({ endpoint: z.url('is not an address').max(1000), keys: z.object({ p256dh: base64url(200), auth: base64url(100) }) });
export type CreateDevice = z.infer<typeof createDevice>;
export const deviceSchema = z.object({ id });

/** The page behind a link that takes an alert. */
export const takePage = z.object({
  person: z.string(),
  batch: z.object({ id, name: z.string(), tag: z.number().nullable() }),
  call: z.enum(CALL_NAMES),
  level: z.enum(ALERT_LEVELS),
  kind: z.string().nullable(),
  headline: z.string(),
  reason: z.string(),
  act: z.string().nullable(),
  since: z.string(),
  state: z.enum(ALERT_STATES),
  taken_by: z.string().nullable(),
  gone: alertSchema.shape.gone,
  /** The link has done what it can do. */
  used: z.boolean(),
});
export type TakePage = z.infer<typeof takePage>;
