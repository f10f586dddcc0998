import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { updateEscalation } from '@/lib/services/messages/update';

export const PATCH = route(endpoints.updateEscalation, ({ actor, session, body }) => updateEscalation(actor, session.signInId, body));
