import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getBatch } from '@/lib/services/batches/get';
import { updateBatch } from '@/lib/services/batches/update';

export const GET = route(endpoints.getBatch, ({ actor, params }) => getBatch(actor, params.id));
export const PATCH = route(endpoints.updateBatch, ({ actor, params, body }) => updateBatch(actor, params.id, body));
