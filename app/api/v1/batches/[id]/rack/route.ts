import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { rackBatch } from '@/lib/services/family/rack';

export const POST = route(endpoints.rackBatch, ({ actor, params, body }) => rackBatch(actor, params.id, body));
