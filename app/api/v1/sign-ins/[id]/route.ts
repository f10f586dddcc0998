import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { endSignIn } from '@/lib/services/people/end-sign-in';

export const DELETE = route(endpoints.endSignIn, ({ session, params }) => endSignIn(session.personId, params.id));
