import { Server, type IncomingMessage, type ServerResponse } from 'node:http';

type Emit = (this: Server, event: string | symbol, ...given: unknown[]) => boolean;

/** Has every request of this process's web server looked at before Next.js hears it; true means that it was answered. */
export function beforeEachRequest(look: (request: IncomingMessage, response: ServerResponse) => boolean): void {
  const emit = Server.prototype.emit as Emit;
  const heard: Emit = function (event, ...given) {
    if (event === 'request' && look(given[0] as IncomingMessage, given[1] as ServerResponse)) return true;
    return emit.call(this, event, ...given);
  };
  Server.prototype.emit = heard;
}
