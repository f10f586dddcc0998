import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { beginSecondFactor } from '@/lib/services/people/second-factor';

export const POST = route(endpoints.beginSecondFactor, ({ session, body }) => beginSecondFactor(session.personId, body.passphrase));
