import { metrics } from '@/lib/http/metrics';

export const dynamic = 'force-dynamic';

export async function GET(): Promise<Response> {
  const { registry } = metrics();
  return new Response(await registry.metrics(), { headers: { 'content-type': registry.contentType, 'cache-control': 'no-store' } });
}
