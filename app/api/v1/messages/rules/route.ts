import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { updateRule } from '@/lib/services/messages/update';

export const PATCH = route(endpoints.updateRule, ({ actor, session, body }) => updateRule(actor, session.signInId, body));
