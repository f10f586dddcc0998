import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createMust } from '@/lib/services/musts/create';
import { listMusts } from '@/lib/services/musts/list';

export const GET = route(endpoints.listMusts, ({ actor, query }) => listMusts(actor, query));
export const POST = route(endpoints.createMust, ({ actor, body }) => createMust(actor, body.sheet));
