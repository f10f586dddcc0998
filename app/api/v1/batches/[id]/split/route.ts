import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { splitBatch } from '@/lib/services/family/split';

export const POST = route(endpoints.splitBatch, ({ actor, params, body }) => splitBatch(actor, params.id, body));
