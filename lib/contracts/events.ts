import { z } from 'zod';

/** The PostgreSQL channel that says "something changed"; it never carries data. */
export const CHANGES_CHANNEL = 'fallbright_changes';

/** In place of a cellar: about a person wherever they are. It is never sent to a page. */
export const EVERY_CELLAR = 'every';

/** One change in one cellar, as notified and as sent to open pages. */
export const changeSchema = z.object({
  cellar: z.string(),
  kind: z.enum(['reading', 'assessment', 'entry', 'batch', 'alert', 'sensor', 'must', 'job', 'lot', 'share', 'member']),
  /** Batch it concerns, where there is one. */
  batch: z.string().nullable(),
  /** Whose sign-in, role or membership it is; stays within the house. */
  person: z.string().optional(),
});
export type Change = z.infer<typeof changeSchema>;
