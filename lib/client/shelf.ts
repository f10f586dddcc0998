'use client';

import type { ShelfBody } from '../contracts/batches';
import { withQuery } from './fetcher';
import { useResource } from './use-resource';

/** All lanes with their curves between two times (RFC 3339); null waits. */
export function useShelf(span: { from: string; to: string; skip?: number } | null) {
  const { data, ...rest } = useResource<ShelfBody>(span && withQuery('/shelf', span));
  return { shelf: data, ...rest };
}
