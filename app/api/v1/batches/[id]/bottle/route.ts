import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { bottleBatch } from '@/lib/services/bench/bottle';

export const POST = route(endpoints.bottleBatch, ({ actor, params, body }) => bottleBatch(actor, params.id, body));
