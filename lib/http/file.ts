import 'server-only';

/** A file as an answer. It is shown in the browser, or saved under its name; nothing guesses its type. */
export function fileResponse(body: string | Uint8Array<ArrayBuffer>, options: { type: string; filename: string; show?: boolean; headers?: Headers }): Response {
  const headers = new Headers(options.headers ?? { 'cache-control': 'private, no-store' });
  headers.set('content-type', options.type);
  // Names are made here of letters, digits and dashes: nothing to escape.
  headers.set('content-disposition', `${options.show ? 'inline' : 'attachment'}; filename="${options.filename}"`);
  return new Response(body, { status: 200, headers });
}
