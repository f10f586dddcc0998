import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { removeWebhook, updateWebhook } from '@/lib/services/webhooks/manage';

export const PATCH = route(endpoints.updateWebhook, ({ actor, params, body }) => updateWebhook(actor, params.id, body));
export const DELETE = route(endpoints.removeWebhook, ({ actor, params }) => removeWebhook(actor, params.id));
