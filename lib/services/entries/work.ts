import type { Entry } from '@/db/models';
import { detailOf } from '../drink/ledger';

const WORK: Record<string, string> = { split: 'a split', blend: 'a blend', bottling: 'a bottling', fining: 'a fining' };

/** The work that an entry is one line of: other batches or lots rest on it, so that it cannot be changed by itself. Null where nothing does. */
export function partOfWork(entry: Pick<Entry, 'kind' | 'detail'>): string | null {
  if (WORK[entry.kind]) return WORK[entry.kind]!;
  return entry.kind === 'top_up' && detailOf(entry).batch_id ? 'a topping up from another batch' : null;
}
