import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { endAllSignIns } from '@/lib/services/people/end-sign-in';
import { listSignIns } from '@/lib/services/people/list-sign-ins';

export const GET = route(endpoints.listSignIns, ({ session }) => listSignIns(session.personId, session.signInId));
export const DELETE = route(endpoints.endAllSignIns, ({ session }) => endAllSignIns(session.personId));
