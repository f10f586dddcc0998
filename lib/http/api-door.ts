import 'server-only';
import type { ServerResponse } from 'node:http';
import { beforeEachRequest } from './before';
import { apiHeaders } from './headers';
import { wrongMethod } from './methods';

/** The address as Next.js will read it; one that cannot be read was refused before. */
const pathOf = (url: string) => decodeURIComponent(url.replace(/^https?:\/\/[^/?#]*/i, '').split(/[?#]/, 1)[0]!);

/**
 * What holds for every address of the API, said before Next.js hears of it and not
 * in `proxy.ts`: of a body that passes there Next.js keeps a copy, for whoever sends
 * it, and hands on its first 10 MB, which cuts a cellar's archive short.
 */
export function guardApi(): void {
  beforeEachRequest((request, response) => {
    const pathname = pathOf(request.url ?? '/');
    if (!pathname.startsWith('/api/')) return false;
    for (const [name, value] of Object.entries(apiHeaders(pathname))) response.setHeader(name, value);
    const refused = wrongMethod({ method: request.method ?? 'GET', pathname });
    if (!refused) return false;
    void send(refused, response);
    return true;
  });
}

async function send(refused: Response, response: ServerResponse): Promise<void> {
  const body = await refused.text();
  response.writeHead(refused.status, Object.fromEntries(refused.headers)).end(body);
}
