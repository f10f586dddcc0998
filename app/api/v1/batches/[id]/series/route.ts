import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getSeries } from '@/lib/services/batches/get-series';

export const GET = route(endpoints.getSeries, ({ actor, params, query }) => getSeries(actor, params.id, query));
