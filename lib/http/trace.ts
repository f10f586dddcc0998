import { Server, type IncomingMessage, type ServerResponse } from 'node:http';

type Emit = (this: Server, event: string | symbol, ...given: unknown[]) => boolean;

/**
 * TRACE shows a request back to whoever sent it, which nobody here needs (RFC 9110,
 * 9.3.8). Next.js cannot take it for a request at all and answers 500, before any
 * code of ours: so it is refused where the server hears it.
 */
export function refuseTrace(): void {
  const emit = Server.prototype.emit as Emit;
  const heard: Emit = function (event, ...given) {
    const [request, response] = given as [IncomingMessage, ServerResponse];
    if (event !== 'request' || request.method !== 'TRACE') return emit.call(this, event, ...given);
    response.writeHead(405, { allow: 'GET, HEAD, POST, PATCH, DELETE, OPTIONS', 'content-length': 0, connection: 'close' }).end();
    return true;
  };
  Server.prototype.emit = heard;
}
