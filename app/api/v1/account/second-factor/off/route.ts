import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { endSecondFactor } from '@/lib/services/people/second-factor';

export const POST = route(endpoints.endSecondFactor, ({ session, body }) => endSecondFactor(session.personId, body));
