import 'server-only';
import type { NextRequest } from 'next/server';
import type { Endpoint } from '../contracts/endpoints';
import { UnauthenticatedError } from '../errors';
import { eventHub } from './event-hub';
import { problemOf } from './problem';
import { admit } from './route';

/**
 * Server-sent events of the actor's cellar. There is no history to go on from:
 * a `Last-Event-ID` is taken and means nothing, since a page that comes back
 * asks for everything again.
 */
export function streamRoute(endpoint: Endpoint) {
  return async (request: NextRequest): Promise<Response> => {
    try {
      const { session, actor } = await admit(endpoint, request);
      if (!session || !actor) throw new UnauthenticatedError();
      return new Response(eventHub().open(actor, session, request.signal), {
        headers: { 'content-type': 'text/event-stream; charset=utf-8', 'cache-control': 'no-cache, no-transform', 'x-accel-buffering': 'no' },
      });
    } catch (error) {
      return problemOf(error, { method: request.method, path: request.nextUrl.pathname });
    }
  };
}
