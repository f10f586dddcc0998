import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listStays } from '@/lib/services/sensors/look';

export const GET = route(endpoints.listStays, ({ actor, params }) => listStays(actor, params.id));
