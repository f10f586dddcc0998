import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { renewRecoveryCodes } from '@/lib/services/people/second-factor';

export const POST = route(endpoints.renewRecoveryCodes, ({ session, body }) => renewRecoveryCodes(session.personId, body));
