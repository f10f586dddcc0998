import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getMe } from '@/lib/services/people/get-me';
import { updateMe } from '@/lib/services/people/update-me';

export const GET = route(endpoints.getMe, ({ actor }) => getMe(actor));
export const PATCH = route(endpoints.updateMe, ({ session, body }) => updateMe(session.personId, body));
