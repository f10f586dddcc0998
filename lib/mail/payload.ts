import { z } from 'zod';
import { STATE_WORDS } from '../core/calls/attention';
import type { Texts } from '../texts/texts';

/**
 * What a mail is made from, kept in the outbox: a copy of what was true when it
 * was owed, so that a mail sent late still tells what it was sent for.
 */
const alertPayload = z.object({
  template: z.literal('alert'),
  event: z.enum(['opened', 'repeated', 'look_again', 'resolved']),
  at: z.string(),
  alert: z.object({
    id: z.string(),
    rule: z.string(),
    level: z.enum(['act', 'check', 'know']),
    kind: z.string().nullable(),
    since: z.string(),
    headline: z.string(),
    reason: z.string(),
    act: z.string().nullable(),
    changes_it: z.string().nullable(),
    evidence: z.array(z.object({ name: z.string(), value: z.number(), threshold: z.number().nullable(), unit: z.string() })),
  }),
  batch: z.object({ id: z.string(), name: z.string(), tag: z.number().nullable(), place: z.string().nullable(), vessel: z.string() }),
  cellar: z.object({ name: z.string(), time_zone: z.string() }),
});

const ingestPayload = z.object({
  template: z.literal('ingest'),
  event: z.enum(['opened', 'repeated', 'resolved']),
  at: z.string(),
  since: z.string(),
  time_zone: z.string(),
});

/** The morning's rounds and shelf of one cellar, for one person. */
const digestPayload = z.object({
  template: z.literal('digest'),
  at: z.string(),
  cellar: z.object({ name: z.string(), time_zone: z.string() }),
  /** The reader's own clock. */
  time_zone: z.string(),
  jobs: z.array(z.object({ title: z.string(), due: z.string(), late: z.boolean(), exact: z.boolean(), place: z.string().nullable(), taken_by: z.string().nullable() })),
  /** Jobs beyond those. */
  more_jobs: z.number(),
  /** The next one after today; null: none is known. */
  next_job: z.object({ title: z.string(), due: z.string() }).nullable(),
  /** What wants a person first. */
  lanes: z.array(
    z.object({
      id: z.string(),
      name: z.string(),
      tag: z.number().nullable(),
      state: z.enum(STATE_WORDS),
      /** Null: nothing was judged yet. */
      headline: z.string().nullable(),
      /** Whether the yeast is in; told where nothing was judged. */
      pitched: z.boolean().optional(),
      gravity: z.number().nullable(),
    }),
  ),
  more_lanes: z.number(),
  muted: z.array(z.object({ name: z.string(), until: z.string(), by: z.string().nullable() })),
});

/** A clock that somebody started has run down: the second dose of a fining. */
const timerPayload = z.object({
  template: z.literal('timer'),
  due: z.string(),
  title: z.string(),
  note: z.string().nullable(),
  batch: z.object({ id: z.string(), name: z.string(), tag: z.number().nullable(), place: z.string().nullable() }),
  cellar: z.object({ name: z.string(), time_zone: z.string() }),
});

/** Somebody wants to see whether messages reach them. */
const testPayload = z.object({ template: z.literal('test'), at: z.string(), time_zone: z.string() });

export const mailPayload = z.discriminatedUnion('template', [alertPayload, ingestPayload, digestPayload, timerPayload, testPayload]);
export type MailPayload = z.infer<typeof mailPayload>;
export type AlertPayload = z.infer<typeof alertPayload>;
export type IngestPayload = z.infer<typeof ingestPayload>;
export type DigestPayload = z.infer<typeof digestPayload>;
export type TimerPayload = z.infer<typeof timerPayload>;
export type TestPayload = z.infer<typeof testPayload>;

/** A mail ready but for its address. */
export interface Rendered {
  subject: string;
  text: string;
  html: string;
}

export interface RenderContext {
  /** Where links lead, without a slash at the end. */
  publicUrl: string;
  /** The reader's language and units. */
  texts: Texts;
  /** By alert: the address at which this reader takes it without signing in. */
  takeUrls?: ReadonlyMap<string, string>;
}
