import { cellarCookie, setCookie } from '@/lib/auth/cookies';
import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createCellar } from '@/lib/services/cellars/own';

export const POST = route(endpoints.createCellar, async ({ session, body, headers }) => {
  const made = await createCellar(session.personId, body);
  headers.append('set-cookie', setCookie(cellarCookie(), made.id));
  return made;
});
