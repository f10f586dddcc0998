import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createBatch } from '@/lib/services/batches/create';
import { listBatches } from '@/lib/services/batches/list';

export const GET = route(endpoints.listBatches, ({ actor, query }) => listBatches(actor, query));
export const POST = route(endpoints.createBatch, ({ actor, body }) => createBatch(actor, body));
