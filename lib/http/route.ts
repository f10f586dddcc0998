import 'server-only';
import type { NextRequest } from 'next/server';
import { z } from 'zod';
import { authorize } from '../auth/authorize';
import type { Actor } from '../auth/policies';
import { sessionOf, sessionOfBearer, type Session } from '../auth/session';
import type { Endpoint } from '../contracts/endpoints';
import { ForbiddenError, InvalidError, NotFoundError, UnauthenticatedError, UnavailableError, type FieldErrors } from '../errors';
import { withOrigin } from '../origin';
import { addressOf } from './address';
import { BODY_LIMIT_BYTES, readBytes, readJson } from './body';
import { metrics } from './metrics';
import { problemOf } from './problem';
import { requireSameSite } from './same-site';
import { countWrongToken } from './wrong-tokens';
import { sentencesOf } from '@/lib/contracts/issues';

type Parsed<S> = S extends z.ZodType ? z.output<S> : undefined;
/** Where there is no schema: nothing, or a file that the route made itself. */
type Answer<S> = S extends z.ZodType ? z.output<S> : Response | void;
type Part<E extends Endpoint, K extends 'params' | 'query' | 'body'> = E extends Record<K, infer S> ? Parsed<S> : undefined;

export interface RouteContext<E extends Endpoint> {
  request: NextRequest;
  /** Absent only where anyone may call; what a person does for themself is never done by a token. */
  session: E['access'] extends 'anyone' ? null : E['access'] extends 'person' ? Session & { signInId: string } : Session;
  /** Null where it is enough to be signed in, or not even that. */
  actor: E['access'] extends 'person' | 'anyone' ? null : Actor;
  params: Part<E, 'params'>;
  query: Part<E, 'query'>;
  body: Part<E, 'body'>;
  /** The body where it is a file. */
  file: E extends Record<'file', readonly string[]> ? Uint8Array : undefined;
  /** Headers to add to a good answer. */
  headers: Headers;
}

/** Longer than any answer takes; past it the database stalls, and waiting longer helps nobody. */
const DEADLINE_MS = 6_000;

/**
 * A route: who asks, may they, is the request well formed, one service call, an
 * answer held to its schema. Whatever is thrown becomes a problem document.
 */
export function route<E extends Endpoint>(endpoint: E, handle: (context: RouteContext<E>) => Promise<Answer<E['response']>>) {
  return async (request: NextRequest, context: { params?: Promise<Record<string, string>> }): Promise<Response> => {
    const done = metrics().requests.startTimer({ method: endpoint.method, route: endpoint.path });
    const response = await answer(endpoint, handle, request, context.params).catch((error: unknown) => problemOf(error, { method: request.method, path: request.nextUrl.pathname }));
    done({ status: response.status });
    return response;
  };
}

async function answer<E extends Endpoint>(endpoint: E, handle: (context: RouteContext<E>) => Promise<Answer<E['response']>>, request: NextRequest, rawParams: Promise<Record<string, string>> | undefined): Promise<Response> {
  const { session, actor } = await inTime(admit(endpoint, request), endpoint.method === 'GET' ? 'reading' : 'asking');
  const headers = new Headers({ 'cache-control': 'private, no-store' });
  // For the service worker, which keeps an answer under this name alone.
  if (actor) headers.set('x-fallbright-for', `${actor.personId}.${actor.cellarId}`);
  const context = {
    request,
    session,
    actor,
    // Next.js gives none where the path has none.
    params: parseParams(endpoint, (await rawParams) ?? {}),
    query: parse(endpoint.query, queryOf(request), 'Some values of the query are wrong.'),
    // However slow its line is, a body has time to come in.
    body: endpoint.body ? parse(endpoint.body, await readJson(request, endpoint.limitBytes), 'Some values are wrong.') : undefined,
    file: endpoint.file ? await readBytes(request, endpoint.limitBytes ?? BODY_LIMIT_BYTES) : undefined,
    headers,
    // The conditional types of the context follow the endpoint's literal; the checks above make them hold.
  } as RouteContext<E>;
  const work = async () => answered(endpoint, await withOrigin(originOf(request, session), () => handle(context)), headers);
  return inTime(work(), endpoint.method === 'GET' ? 'reading' : 'changing', endpoint.deadlineMs);
}

function answered(endpoint: Endpoint, result: unknown, headers: Headers): Response {
  if (result instanceof Response) return result;
  if (endpoint.response === null) return new Response(null, { status: endpoint.status, headers });
  return Response.json(endpoint.response.parse(result), { status: endpoint.status, headers });
}

/** @throws UnauthenticatedError, ForbiddenError, RequestError: who asks comes before what they ask. */
export async function admit(endpoint: Endpoint, request: NextRequest): Promise<{ session: Session | null; actor: Actor | null }> {
  const { access } = endpoint;
  if (access === 'anyone') return { session: null, actor: null };
  if (access === 'sensor') throw new Error('A sensor’s route checks its own credential.');
  const session = await sessionFor(endpoint, request);
  if (access === 'person') return { session, actor: null };
  if (!session.actor) throw new ForbiddenError('You do not belong to a cellar. Ask its keeper to invite you.');
  if (access !== 'member') authorize(session.actor, access);
  return { session, actor: session.actor };
}

/**
 * Whose request it is. A program shows a token, and its cookies count for nothing;
 * only what a browser sends along by itself has to come from our own pages.
 */
async function sessionFor(endpoint: Endpoint, request: NextRequest): Promise<Session> {
  const header = request.headers.get('authorization');
  if (header === null) {
    if (endpoint.method !== 'GET') requireSameSite(request);
    const session = await sessionOf(request.cookies);
    if (!session) throw new UnauthenticatedError();
    return session;
  }
  const session = await sessionOfBearer(header);
  if (!session) {
    await countWrongToken(addressOf(request));
    throw new UnauthenticatedError('This token is not valid: revoked, expired, or never made.');
  }
  if (endpoint.access === 'person' || endpoint.by === 'session') throw new ForbiddenError('This is done in the browser by the person, not with a token.');
  return session;
}

const originOf = (request: NextRequest, session: Session | null) => ({ address: addressOf(request), means: session?.token ? `token …${session.token.lastFour}` : session ? 'session' : 'open' });

/** A query as an object; a name given twice stays a list, which no schema here takes. */
function queryOf(request: NextRequest): Record<string, string | string[]> {
  const query: Record<string, string | string[]> = {};
  for (const name of new Set(request.nextUrl.searchParams.keys())) {
    const values = request.nextUrl.searchParams.getAll(name);
    query[name] = values.length === 1 ? values[0]! : values;
  }
  return query;
}

/** A path that names nothing possible names nothing: 404, as for a thing that is not there. */
function parseParams(endpoint: Endpoint, raw: Record<string, string>): unknown {
  if (!endpoint.params) return undefined;
  const parsed = endpoint.params.safeParse(raw);
  if (!parsed.success) throw new NotFoundError();
  return parsed.data;
}

function parse(schema: z.ZodType | undefined, value: unknown, message: string): unknown {
  if (!schema) return undefined;
  const parsed = schema.safeParse(value);
  if (!parsed.success) throw new InvalidError(message, fieldErrors(parsed.error));
  return parsed.data;
}

export const fieldErrors = (error: z.ZodError): FieldErrors => sentencesOf(error.issues, 'body');

/** What a request that the database keeps waiting is told, by what may have been done meanwhile. */
const LATE = {
  asking: 'The database takes too long right now. Nothing was changed; try again in a moment.',
  reading: 'It could not be read just now; trying again.',
  changing: 'The database takes too long right now. Look whether the change was kept before you try again.',
};

/** Answers "not now" where the database stalls. */
export async function inTime<T>(work: Promise<T>, doing: keyof typeof LATE, deadlineMs = DEADLINE_MS): Promise<T> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new UnavailableError(LATE[doing])), deadlineMs);
  });
  try {
    return await Promise.race([work, late]);
  } finally {
    clearTimeout(timer);
  }
}
