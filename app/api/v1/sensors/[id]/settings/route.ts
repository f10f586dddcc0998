import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { setSensor } from '@/lib/services/sensors/set';

export const POST = route(endpoints.setSensor, ({ actor, params, body }) => setSensor(actor, params.id, body));
