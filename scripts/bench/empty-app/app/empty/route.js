export const dynamic = 'force-dynamic';

/** What the framework itself takes to answer with nothing: the floor under every route. */
export function GET() {
  return Response.json({ ok: true });
}
