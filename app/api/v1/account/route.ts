import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { deleteAccount } from '@/lib/services/people/delete-account';
import { getAccount } from '@/lib/services/people/get-account';

export const GET = route(endpoints.getAccount, ({ session }) => getAccount(session.personId));
export const DELETE = route(endpoints.deleteAccount, ({ session, body }) => deleteAccount(session.personId, body));
