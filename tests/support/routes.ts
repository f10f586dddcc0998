import { join } from 'node:path';
import { NextRequest } from 'next/server';
import type { Endpoint } from '@/lib/contracts/endpoints';

/** A route's handler, called as Next.js calls it; a test that uses it mocks `server-only`. */
export type Handler = (request: NextRequest, context: { params: Promise<Record<string, string>> }) => Promise<Response>;

export async function handlerOf({ method, path }: Pick<Endpoint, 'method' | 'path'>): Promise<Handler> {
  const folder = path.replace(/\{(\w+)\}/g, '[$1]');
  const handlers = (await import(join(process.cwd(), 'app/api/v1', folder, 'route.ts'))) as Record<string, Handler>;
  return handlers[method]!;
}

export interface Asked {
  params?: Record<string, string>;
  query?: string;
  body?: BodyInit;
  headers?: Record<string, string>;
  cookie?: string;
}

const HOUSE = 'http://127.0.0.1';

/** Asks an endpoint in this process, as one of our own pages would unless `headers` say otherwise. */
export async function askRoute(endpoint: Pick<Endpoint, 'method' | 'path'>, { params = {}, query = '', body, headers = {}, cookie }: Asked = {}): Promise<Response> {
  const path = endpoint.path.replace(/\{(\w+)\}/g, (_, name: string) => encodeURIComponent(params[name] ?? ''));
  const streamed = body instanceof ReadableStream ? { duplex: 'half' as const } : {};
  const request = new NextRequest(`${HOUSE}/api/v1${path}${query && `?${query}`}`, { method: endpoint.method, body, ...streamed, headers: { ...(cookie && { cookie }), ...(body !== undefined && { 'content-type': 'application/json' }), 'sec-fetch-site': 'same-origin', ...headers } });
  return (await handlerOf(endpoint))(request, { params: Promise.resolve(params) });
}
