import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { openBottles } from '@/lib/services/lots/open';

export const POST = route(endpoints.openBottles, ({ actor, params, body }) => openBottles(actor, params.id, body));
