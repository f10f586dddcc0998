import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getLot } from '@/lib/services/lots/get';
import { updateLot } from '@/lib/services/lots/update';

export const GET = route(endpoints.getLot, ({ actor, params }) => getLot(actor, params.id));
export const PATCH = route(endpoints.updateLot, ({ actor, params, body }) => updateLot(actor, params.id, body));
