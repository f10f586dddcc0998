import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { tryWebhook } from '@/lib/services/webhooks/manage';

export const POST = route(endpoints.tryWebhook, ({ actor, params }) => tryWebhook(actor, params.id));
