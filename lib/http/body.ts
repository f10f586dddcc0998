import 'server-only';
import { RequestError } from './problem';

/** More than any form holds; readings have a limit of their own. */
export const BODY_LIMIT_BYTES = 1_000_000;

/**
 * The body as JSON, read no further than the limit, whatever its length header says.
 * @throws RequestError where it is too large, not JSON, or not UTF-8.
 */
export async function readJson(request: Request, limit = BODY_LIMIT_BYTES): Promise<unknown> {
  const type = request.headers.get('content-type');
  const wrongType = !/^application\/([a-z0-9.+-]+\+)?json\b/i.test(type ?? '');
  if (wrongType && type !== null) throw new RequestError('unsupported-media-type', 'Send application/json.');
  const bytes = await readBytes(request, limit);
  // A request without a body has no type to name: all that it could say is left out.
  if (bytes.length === 0) return {};
  if (wrongType) throw new RequestError('unsupported-media-type', 'Send application/json.');
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes));
  } catch {
    throw new RequestError('malformed', 'The body is not JSON in UTF-8.');
  }
}

/** The body as it is, read no further than the limit. */
export async function readBytes(request: Request, limit: number): Promise<Uint8Array> {
  const tooLarge = () => new RequestError('too-large', `The body may have at most ${limit} bytes.`);
  if (Number(request.headers.get('content-length') ?? 0) > limit) throw tooLarge();
  const parts: Uint8Array[] = [];
  let size = 0;
  const reader = request.body?.getReader();
  while (reader) {
    const { done, value } = await reader.read().catch(() => {
      throw new RequestError('malformed', 'The body ended before it was whole.');
    });
    if (done) break;
    size += value.length;
    if (size > limit) {
      await reader.cancel();
      throw tooLarge();
    }
    parts.push(value);
  }
  return Buffer.concat(parts);
}
