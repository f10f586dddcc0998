/** The family tree of batches: which batch holds how much of which. */

/** Litres that went from one batch into another, by a split, a racking or a blend. */
export interface Branch {
  from: string;
  to: string;
  litres: number;
}

/** Share of a batch that comes from one source batch, 0 to 1. */
export interface Ancestor {
  batch: string;
  share: number;
}

export class FamilyError extends Error {}

/**
 * Where a batch comes from: the shares, by volume, of the batches that themselves
 * came from nowhere. `ownLitres` counts what was made in a batch itself (must put
 * into it) beside what flowed in; a batch with no inflow is its own source.
 * Shares add up to 1. A batch that would be its own ancestor is refused.
 */
export function ancestry(batch: string, branches: readonly Branch[], ownLitres: Readonly<Record<string, number>> = {}): Ancestor[] {
  const shares = sharesOf(batch, branches, ownLitres, new Set(), new Map());
  return [...shares].map(([name, share]) => ({ batch: name, share })).sort((a, b) => b.share - a.share || (a.batch < b.batch ? -1 : 1));
}

function sharesOf(
  batch: string,
  branches: readonly Branch[],
  ownLitres: Readonly<Record<string, number>>,
  path: ReadonlySet<string>,
  known: Map<string, Map<string, number>>,
): Map<string, number> {
  const done = known.get(batch);
  if (done) return done;
  if (path.has(batch)) throw new FamilyError(`batch ${batch} cannot be its own ancestor`);
  const inflows = branches.filter((b) => b.to === batch && b.litres > 0);
  const own = ownLitres[batch] ?? 0;
  const total = own + inflows.reduce((sum, b) => sum + b.litres, 0);
  const shares = new Map<string, number>();
  if (total === 0) shares.set(batch, 1);
  else {
    if (own > 0) shares.set(batch, own / total);
    const deeper = new Set(path).add(batch);
    for (const inflow of inflows) {
      for (const [name, share] of sharesOf(inflow.from, branches, ownLitres, deeper, known)) {
        shares.set(name, (shares.get(name) ?? 0) + (share * inflow.litres) / total);
      }
    }
  }
  known.set(batch, shares);
  return shares;
}
