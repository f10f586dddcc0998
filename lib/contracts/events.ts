import { z } from 'zod';

/** The PostgreSQL channel that says "something changed"; it never carries data. */
export const CHANGES_CHANNEL = 'fallbright_changes';

/** One change in one cellar, as notified and as sent to open pages. */
export const changeSchema = z.object({
  cellar: z.string(),
  kind: z.enum(['reading', 'assessment', 'entry', 'batch', 'alert', 'sensor', 'must', 'job', 'lot', 'share']),
  /** Batch it concerns, where there is one. */
  batch: z.string().nullable(),
});
export type Change = z.infer<typeof changeSchema>;
