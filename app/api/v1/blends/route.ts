import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { blendBatches } from '@/lib/services/family/blend';

export const POST = route(endpoints.blendBatches, ({ actor, body }) => blendBatches(actor, body));
