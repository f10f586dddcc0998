import 'server-only';
import { endpoints, type Endpoint } from '../contracts/endpoints';
import { problemResponse } from './problem-response';

/** Each line of the table as a pattern with its methods. Next.js answers HEAD as GET without its body, and OPTIONS by itself. */
const LINES = Object.values<Endpoint>(endpoints).map(({ path, method }) => ({
  pattern: new RegExp(`^/api/v1${path.replaceAll('.', '\\.').replace(/\{\w+\}/g, '[^/]+')}/?$`),
  methods: method === 'GET' ? ['GET', 'HEAD', 'OPTIONS'] : [method, 'OPTIONS'],
}));

/** RFC 9110 15.5.6: what is asked of an address in a method that it does not have; null for all else. Next.js would answer an empty 405 with no `Allow`. */
export function wrongMethod({ method, pathname }: { method: string; pathname: string }): Response | null {
  const allowed = new Set<string>(LINES.filter(({ pattern }) => pattern.test(pathname)).flatMap(({ methods }) => methods));
  if (allowed.size === 0 || allowed.has(method)) return null;
  const allow = [...allowed].join(', ');
  return problemResponse('method-not-allowed', `This address takes ${allow}.`, { headers: { allow } });
}
