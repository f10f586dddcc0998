'use client';

import useSWR, { mutate, type SWRConfiguration } from 'swr';
import { ClientError, getJson } from './fetcher';

export interface Resource<T> {
  /** Undefined until the first answer; then the last good one, also while a newer one is on its way or failed. */
  data: T | undefined;
  error: ClientError | undefined;
  /** Nothing to show yet. */
  loading: boolean;
  /** Asks again now. */
  retry: () => void;
}

const OPTIONS: SWRConfiguration = {
  keepPreviousData: true,
  dedupingInterval: 500,
  errorRetryInterval: 3_000,
  shouldRetryOnError: (error: unknown) => !(error instanceof ClientError) || error.transient,
};

/** One resource by its path below `/api/v1`; a null path waits until its parts are known. */
export function useResource<T>(path: string | null, options: SWRConfiguration = {}): Resource<T> {
  const { data, error, isLoading, mutate: again } = useSWR<T, ClientError>(path, getJson, { ...OPTIONS, ...options });
  return { data, error, loading: isLoading && data === undefined, retry: () => void again() };
}

/** Asks again for every open resource whose path `matches`. */
export async function refresh(matches: (path: string) => boolean): Promise<void> {
  await mutate((key) => typeof key === 'string' && matches(key));
}

/** The path itself, or the same path with a query. */
export const isPath = (path: string) => (key: string) => key === path || key.startsWith(`${path}?`);
