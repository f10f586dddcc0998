import { cellarCookie, setCookie } from '@/lib/auth/cookies';
import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { acceptInvitation } from '@/lib/services/invitations/accept';

export const POST = route(endpoints.acceptInvitation, async ({ session, body, headers }) => {
  const joined = await acceptInvitation(session.personId, body.token);
  headers.append('set-cookie', setCookie(cellarCookie(), joined.id));
  return joined;
});
