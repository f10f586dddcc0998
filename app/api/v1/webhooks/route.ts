import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createWebhook, listWebhooks } from '@/lib/services/webhooks/manage';

export const GET = route(endpoints.listWebhooks, ({ actor }) => listWebhooks(actor));
export const POST = route(endpoints.createWebhook, ({ actor, body }) => createWebhook(actor, body));
