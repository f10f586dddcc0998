import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listLots } from '@/lib/services/lots/list';

export const GET = route(endpoints.listLots, ({ actor, query }) => listLots(actor, query));
