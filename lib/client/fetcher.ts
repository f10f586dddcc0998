import type { Problem } from '../contracts/common';
import { KEPT_HEADER, noteAnswer } from './kept';

const BASE = '/api/v1';

/** An answer that is not what was asked for: a problem document (RFC 9457), or no answer at all. */
export class ClientError extends Error {
  override name = 'ClientError';
  constructor(
    /** 0: the server was not reached. */
    readonly status: number,
    /** Last part of the problem's type: `invalid`, `not-found`, `unreachable`, … */
    readonly code: string,
    message: string,
    /** Sentences by field, where a form was wrong. */
    readonly fields: Record<string, string[]> = {},
    readonly retryAfterS: number | null = null,
  ) {
    super(message);
  }

  /** Trying again without a change may help. */
  get transient(): boolean {
    return this.status === 0 || this.status >= 500;
  }
}

function errorOf(response: Response, problem: Partial<Problem> | null): ClientError {
  const code = problem?.type?.split(':').at(-1) ?? (response.status >= 500 ? 'internal' : 'refused');
  const retryAfter = Number(response.headers.get('retry-after'));
  return new ClientError(
    response.status,
    code,
    problem?.detail ?? problem?.title ?? `The server answered ${response.status}. Try again.`,
    problem?.errors ?? {},
    Number.isFinite(retryAfter) && retryAfter > 0 ? retryAfter : null,
  );
}

async function request<T>(path: string, init: RequestInit, keptToo = true): Promise<T> {
  let response: Response;
  try {
    response = await fetch(`${BASE}${path}`, { ...init, headers: { accept: 'application/json', ...init.headers }, credentials: 'same-origin' });
  } catch {
    throw unreachable();
  }
  const kept = response.headers.get(KEPT_HEADER);
  if (kept !== null && !keptToo) throw unreachable();
  const body: unknown = response.status === 204 ? null : await response.json().catch(() => null);
  if (!response.ok) throw errorOf(response, body as Partial<Problem> | null);
  if (init.method === 'GET') noteAnswer(path, kept);
  return body as T;
}

const unreachable = () => new ClientError(0, 'unreachable', 'The server cannot be reached. Nothing was lost; try again when you are online.');

/** Reads a resource; `path` is below `/api/v1`. The server parses every answer by its schema, so that the type holds. */
export const getJson = <T>(path: string): Promise<T> => request<T>(path, { method: 'GET' });

/** As `getJson`, and never what the device kept. */
export const getFresh = <T>(path: string, signal?: AbortSignal): Promise<T> => request<T>(path, { method: 'GET', ...(signal && { signal }) }, false);

export const sendJson = <T>(method: 'POST' | 'PATCH' | 'DELETE', path: string, body?: unknown, signal?: AbortSignal): Promise<T> =>
  request<T>(path, { method, ...(signal && { signal }), ...(body === undefined ? {} : { headers: { 'content-type': 'application/json' }, body: JSON.stringify(body) }) });

/** Sends a file as it is. */
export const sendFile = <T>(path: string, file: Blob): Promise<T> => request<T>(path, { method: 'POST', headers: { 'content-type': file.type || 'application/octet-stream' }, body: file });

/** `path?a=1&b=2`, leaving out what is null or undefined; the same values always give the same string, so it serves as a cache key. */
export function withQuery(path: string, query: Record<string, string | number | null | undefined>): string {
  const given = Object.entries(query).filter((pair): pair is [string, string | number] => pair[1] !== null && pair[1] !== undefined);
  return given.length === 0 ? path : `${path}?${new URLSearchParams(given.map(([name, value]) => [name, String(value)])).toString()}`;
}
