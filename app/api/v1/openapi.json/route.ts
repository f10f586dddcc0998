import { sessionCookie } from '@/lib/auth/cookies';
import { openApi } from '@/lib/contracts/openapi';

export const dynamic = 'force-dynamic';

export function GET(): Response {
  return Response.json(openApi(sessionCookie()));
}
