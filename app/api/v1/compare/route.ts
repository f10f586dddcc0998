import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { compareBatches } from '@/lib/services/compare/compare';

export const GET = route(endpoints.compareBatches, ({ actor, query }) => compareBatches(actor, query));
