import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { moveBottles } from '@/lib/services/lots/move';

export const POST = route(endpoints.moveBottles, ({ actor, params, body }) => moveBottles(actor, params.id, body));
