import { cellarCookie, setCookie } from '@/lib/auth/cookies';
import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { chooseCellar } from '@/lib/services/cellars/choose';

export const POST = route(endpoints.chooseCellar, async ({ session, body, headers }) => {
  await chooseCellar(session.personId, body.cellar_id);
  headers.append('set-cookie', setCookie(cellarCookie(), body.cellar_id));
});
