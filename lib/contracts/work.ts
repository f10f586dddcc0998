const WORK: Readonly<Record<string, string>> = { split: 'a split', blend: 'a blend', bottling: 'a bottling', fining: 'a fining' };

/** The work that a line of the log is one part of: other batches or lots rest on it, so that it cannot be changed by itself. Null where nothing does. */
export function partOfWork({ kind, detail }: { kind: string; detail?: unknown }): string | null {
  const from = typeof detail === 'object' && detail !== null && 'batch_id' in detail && detail.batch_id;
  return WORK[kind] ?? (kind === 'top_up' && from ? 'a topping up from another batch' : null);
}
