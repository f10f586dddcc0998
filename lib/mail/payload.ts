import { z } from 'zod';

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

export const mailPayload = z.discriminatedUnion('template', [alertPayload, ingestPayload]);
export type MailPayload = z.infer<typeof mailPayload>;
export type AlertPayload = z.infer<typeof alertPayload>;
export type IngestPayload = z.infer<typeof ingestPayload>;

/** A mail ready but for its address. */
export interface Rendered {
  subject: string;
  text: string;
  html: string;
}

export interface RenderContext {
  /** Where links lead, without a slash at the end. */
  publicUrl: string;
}
