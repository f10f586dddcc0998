import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { askForMailChange, dropMailChange } from '@/lib/services/people/change-mail';

export const POST = route(endpoints.changeMail, ({ session, body }) => askForMailChange(session.personId, body));
export const DELETE = route(endpoints.dropMailChange, ({ session }) => dropMailChange(session.personId));
