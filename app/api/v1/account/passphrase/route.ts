import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { changePassphrase } from '@/lib/services/people/passphrase';

export const POST = route(endpoints.changePassphrase, ({ session, body }) => changePassphrase(session.personId, session.signInId, body));
