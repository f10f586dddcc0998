import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listTrail } from '@/lib/services/audit/list';

export const GET = route(endpoints.listTrail, ({ actor, query }) => listTrail(actor, query));
