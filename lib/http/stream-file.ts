import 'server-only';

/** A file that is made while it is sent; it ends when its reader goes. */
export function streamedFile(pieces: AsyncGenerator<string>, options: { type: string; filename: string }): Response {
  const encoder = new TextEncoder();
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const { value, done } = await pieces.next();
      if (done) controller.close();
      else controller.enqueue(encoder.encode(value));
    },
    async cancel() {
      await pieces.return(undefined);
    },
  });
  return new Response(body, { status: 200, headers: { 'content-type': options.type, 'content-disposition': `attachment; filename="${options.filename}"`, 'cache-control': 'private, no-store', 'x-content-type-options': 'nosniff' } });
}
