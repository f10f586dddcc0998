import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listRawReadings } from '@/lib/services/sensors/look';

export const GET = route(endpoints.listRawReadings, ({ actor, params, query }) => listRawReadings(actor, params.id, query.limit));
