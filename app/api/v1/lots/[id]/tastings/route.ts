import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createTasting, listTastings } from '@/lib/services/tastings/write';

export const GET = route(endpoints.listTastings, ({ actor, params }) => listTastings(actor, params.id));
export const POST = route(endpoints.createTasting, ({ actor, params, body }) => createTasting(actor, params.id, body));
