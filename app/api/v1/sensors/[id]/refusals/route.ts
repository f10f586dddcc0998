import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listRefusals } from '@/lib/services/sensors/list-refusals';

export const GET = route(endpoints.listRefusals, ({ actor, params }) => listRefusals(actor, params.id));
