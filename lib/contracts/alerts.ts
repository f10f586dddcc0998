import { z } from 'zod';
import { MEANS } from '../core/alerts/telling';
import { CALL_NAMES } from '../core/types';
import { callSchema } from './assessment';
import { id, text, timestamp } from './common';

/** `open`: nobody has it. `acknowledged`: someone said they have it. */
export const ALERT_STATES = ['open', 'acknowledged', 'resolved'] as const;
/** `act`: a person acts within the hour. `check`: go and look. `know`: may be done any day. */
export const ALERT_LEVELS = ['act', 'check', 'know'] as const;

export const alertSchema = z.object({
  id,
  batch: z.object({ id, name: z.string(), tag: z.number().nullable(), vessel_kind: z.string(), drink_colour: z.string(), neck: z.string(), volume_l: z.number(), vessel_l: z.number() }),
  call: z.enum(CALL_NAMES),
  kind: z.string().nullable(),
  level: z.enum(ALERT_LEVELS),
  state: z.enum(ALERT_STATES),
  /** Since when the call is true, which may be before the alert opened. */
  since: z.string(),
  opened_at: z.string(),
  acknowledged_at: z.string().nullable(),
  acknowledged_by: z.object({ id, name: z.string() }).nullable(),
  /** What that person said they will do, and when they look again. */
  note: z.string().nullable(),
  look_again_at: z.string().nullable(),
  resolved_at: z.string().nullable(),
  /** Null: the program saw that it had passed. */
  resolved_by: z.object({ id, name: z.string() }).nullable(),
  /** What it is about is no longer so since then; it is over at `kept_until` if that lasts. Null: it is so. */
  gone: z.object({ since: z.string(), kept_until: z.string() }).nullable(),
  /** The call as it was last while it was so. */
  evidence: callSchema,
  /** Who was told, when, by which means, and whether it went. */
  told: z.array(
    z.object({
      person: z.string(),
      means: z.enum(MEANS),
      at: z.string().nullable(),
      /** `held`: it waits until `due`, for quiet hours, a mute or somebody else's turn. `dropped`: nobody had to hear it any more; `error` says why. */
      state: z.enum(['waiting', 'held', 'sent', 'failed', 'dropped']),
      held_by: z.enum(['quiet', 'mute', 'turn']).nullable(),
      due: z.string().nullable(),
      error: z.string().nullable(),
    }),
  ),
  /** The vessel is muted until then. */
  muted_until: z.string().nullable(),
});
export type AlertBody = z.infer<typeof alertSchema>;

export const alertList = z.object({ items: z.array(alertSchema), counts: z.object({ open: z.number(), acknowledged: z.number(), resolved: z.number() }), next_cursor: z.string().nullable() });
export const alertQuery = z.object({ state: z.enum(ALERT_STATES).optional(), batch: id.optional(), cursor: z.string().max(200).optional(), limit: z.coerce.number().int().min(1).max(200).default(50) });

export const acknowledgeAlert = z.object({ note: text(500).nullable().default(null), look_again_at: timestamp.nullable().default(null) });
export type AcknowledgeAlert = z.infer<typeof acknowledgeAlert>;

/** A person says that it was no fault, or that it is done. */
export const resolveAlert = z.object({ note: text(500).nullable().default(null) });
