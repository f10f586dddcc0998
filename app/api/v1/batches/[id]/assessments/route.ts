import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listVerdictChanges } from '@/lib/services/batches/list-verdict-changes';

export const GET = route(endpoints.listVerdictChanges, ({ actor, params, query }) => listVerdictChanges(actor, params.id, query));
