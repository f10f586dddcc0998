import { z } from 'zod';
import type { Action } from '../core/actions';
import { id } from './common';

/**
 * Who may call it: a role's action in the active cellar, any member of a cellar,
 * anybody signed in, a sensor with its secret, or anyone.
 */
export type Access = Action | 'member' | 'person' | 'sensor' | 'anyone';

export interface Endpoint {
  method: 'GET' | 'POST' | 'PATCH' | 'DELETE';
  /** Below `/api/v1`, as OpenAPI writes it. */
  path: string;
  summary: string;
  access: Access;
  /** `session`: from a browser that is signed in, never with a token. So is every endpoint whose access is `person`. */
  by?: 'session';
  params?: z.ZodObject;
  query?: z.ZodType;
  body?: z.ZodType;
  /** The kinds of file of which the body is one, in place of JSON. */
  file?: readonly string[];
  /** Where the body may be larger than a form. */
  limitBytes?: number;
  /** Where it may take longer than a page waits, once the body is here. */
  deadlineMs?: number;
  /** Null: no JSON body. */
  response: z.ZodType | null;
  status: 200 | 201 | 202 | 204;
}

export const endpoint = <const E extends Endpoint>(definition: E) => definition;

export const byId = z.object({ id });
