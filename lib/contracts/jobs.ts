import { z } from 'zod';
import { callSchema } from './assessment';
import { id, line, text, timestamp } from './common';

/** What a job is about; `other` is whatever somebody wrote down. */
export const JOB_KINDS = ['reading', 'start', 'neck', 'stalled', 'temperature', 'sensor', 'rack', 'bottle', 'airlock', 'feed', 'fining_b', 'settle', 'condition', 'test_bottle', 'pressure', 'other'] as const;

/** A call of the program, a time from the last log entry, a clock that was started, or a person. */
export const JOB_SOURCES = ['call', 'schedule', 'timer', 'person'] as const;
export const JOB_STATES = ['open', 'done', 'dropped'] as const;

/** A tick can be taken back this long. */
export const UNDO_S = 10;

const who = z.object({ id, name: z.string() }).nullable();

export const jobSchema = z.object({
  id,
  kind: z.enum(JOB_KINDS),
  /** `Read Rye beer by hand` */
  title: z.string(),
  /** Why, in the words of the call, or what the person added. */
  note: z.string().nullable(),
  source: z.enum(JOB_SOURCES),
  /** What its call was held to when it was last judged; null where no call asks for it. */
  evidence: callSchema.shape.evidence.nullable(),
  state: z.enum(JOB_STATES),
  /** When it is to be done; a snooze moves it. */
  due_at: z.string(),
  /** The hour matters (a second dose), or only the day. */
  exact: z.boolean(),
  batch: z.object({ id, name: z.string(), tag: z.number().nullable(), place: z.string().nullable(), vessel_kind: z.string(), drink_colour: z.string(), neck: z.string(), volume_l: z.number(), vessel_l: z.number() }).nullable(),
  lot: z.object({ id, code: z.string(), name: z.string(), place: z.string().nullable() }).nullable(),
  taken_by: who,
  snoozed_until: z.string().nullable(),
  done_at: z.string().nullable(),
  done_by: who,
  /** Comes again this many days after it was done. */
  repeat_days: z.number().int().nullable(),
  created_by: who,
});
export type JobBody = z.infer<typeof jobSchema>;

export const jobList = z.object({ now: z.string(), items: z.array(jobSchema), next_cursor: z.string().nullable() });
export type JobList = z.infer<typeof jobList>;

export const jobQuery = z.object({
  state: z.enum(JOB_STATES).default('open'),
  /** Only those due by then. */
  until: timestamp.optional(),
  batch: id.optional(),
  lot: id.optional(),
  /** `due`: by time. `walk`: by place, then by the vessel's tag. */
  order: z.enum(['due', 'walk']).default('due'),
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(100),
});

const days = z.number('must be a number of days').int('must be whole days').min(1, 'must be at least a day').max(365, 'must be at most a year');

export const createJob = z
  .object({
    title: line(120),
    note: text(1000).nullable().default(null),
    kind: z.enum(['reading', 'airlock', 'feed', 'rack', 'bottle', 'temperature', 'condition', 'test_bottle', 'other'], 'choose what it is about').default('other'),
    due_at: timestamp,
    exact: z.boolean().default(false),
    batch_id: id.nullable().default(null),
    lot_id: id.nullable().default(null),
    repeat_days: days.nullable().default(null),
  })
  .refine((job) => job.batch_id === null || job.lot_id === null, { path: ['lot_id'], message: 'a job is about a batch or about a lot, not both' });
export type CreateJob = z.infer<typeof createJob>;

export const updateJob = z.object({ title: line(120).optional(), note: text(1000).nullable().optional(), due_at: timestamp.optional(), exact: z.boolean().optional(), repeat_days: days.nullable().optional() });
export type UpdateJob = z.infer<typeof updateJob>;

/** `at`: when it was done; a tick that waited for the network tells. */
export const doneJob = z.object({ at: timestamp.optional() });
export const takeJob = z.object({ taken: z.boolean().default(true) });
export const snoozeJob = z.object({ until: timestamp });

/** The person's own calendar of the cellar's jobs. The address is the key to it: whoever has it can read. */
export const calendarSchema = z.object({ url: z.string().nullable(), made_at: z.string().nullable(), last_read_at: z.string().nullable() });
export type CalendarBody = z.infer<typeof calendarSchema>;
/** A token of an address that is the key by itself. */
export const linkToken = z.string().regex(/^[A-Za-z0-9_-]{32}$/);
