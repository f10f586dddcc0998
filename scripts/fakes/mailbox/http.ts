import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import { listPage, mailPage, missingPage } from './page';
import type { MailStore } from './store';

const HEADERS = {
  'content-security-policy': "default-src 'none'; style-src 'unsafe-inline'; frame-src 'self'; form-action 'self'; base-uri 'self'; frame-ancestors 'none'",
  'x-content-type-options': 'nosniff',
  'referrer-policy': 'no-referrer',
  'cache-control': 'no-store',
};

/** Only names of this machine: a page elsewhere must not read mails through a name that it points here. */
const isOurHost = (host: string | undefined) => /^(127\.0\.0\.1|localhost|\[::1\])(:\d+)?$/.test(host ?? '');
/** A form of another page may be sent here, but not obeyed. */
const isFromHere = ({ headers }: IncomingMessage) => headers.origin === undefined || headers.origin === `http://${headers.host}`;

/** The page that lists the mails and shows one, and the same as JSON. */
export function httpServer(store: MailStore, onError: (error: unknown) => void): Server {
  const html = (response: ServerResponse, status: number, body: string) => response.writeHead(status, { ...HEADERS, 'content-type': 'text/html; charset=utf-8' }).end(body);
  const json = (response: ServerResponse, status: number, body: unknown) => response.writeHead(status, { ...HEADERS, 'content-type': 'application/json' }).end(JSON.stringify(body));

  const answer = async (request: IncomingMessage, response: ServerResponse) => {
    const { pathname, searchParams } = new URL(request.url ?? '/', 'http://localhost');
    const [, id] = /^(?:\/api)?\/mails\/([\w-]+)$/.exec(pathname) ?? [];
    const mail = id === undefined ? null : store.get(id);
    const asked = `${request.method} ${id === undefined ? pathname : pathname.replace(id, ':id')}`;
    if (!isOurHost(request.headers.host) || ((request.method === 'POST' || request.method === 'DELETE') && !isFromHere(request))) return void json(response, 403, { error: 'only from this machine' });
    switch (asked) {
      case 'GET /':
        return void html(response, 200, listPage(store.list()));
      case 'GET /mails/:id':
        return void html(response, mail ? 200 : 404, mail ? mailPage(mail) : missingPage());
      case 'GET /api/mails': {
        const to = searchParams.get('to');
        return void json(response, 200, { items: store.list().filter((item) => to === null || item.envelope.to.includes(to)) });
      }
      case 'GET /api/mails/:id':
        return void json(response, mail ? 200 : 404, mail ?? { error: 'no such mail' });
      case 'DELETE /api/mails':
        await store.clear();
        return void response.writeHead(204, HEADERS).end();
      case 'POST /delete-all':
        await store.clear();
        return void response.writeHead(303, { ...HEADERS, location: '/' }).end();
      default:
        return void json(response, 404, { error: 'no such page' });
    }
  };

  return createServer((request, response) => {
    // Nothing here takes a body.
    request.resume();
    answer(request, response).catch((error: unknown) => {
      onError(error);
      json(response, 500, { error: 'the mailbox failed' });
    });
  });
}
