import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getMessages } from '@/lib/services/messages/get';
import { updateMessages } from '@/lib/services/messages/update';

export const GET = route(endpoints.getMessages, ({ actor, session }) => getMessages(actor, session.signInId));
export const PATCH = route(endpoints.updateMessages, ({ actor, session, body }) => updateMessages(actor, session.signInId, body));
