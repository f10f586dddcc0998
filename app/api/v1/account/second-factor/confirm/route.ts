import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { confirmSecondFactor } from '@/lib/services/people/second-factor';

export const POST = route(endpoints.confirmSecondFactor, ({ session, body }) => confirmSecondFactor(session.personId, body.code));
