import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { topUpBatch } from '@/lib/services/family/rack';

export const POST = route(endpoints.topUpBatch, ({ actor, params, body }) => topUpBatch(actor, params.id, body));
