import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createShare, listShares } from '@/lib/services/shares/manage';

export const GET = route(endpoints.listBatchShares, ({ actor, params }) => listShares(actor, params.id));
export const POST = route(endpoints.createShare, ({ actor, params, body }) => createShare(actor, params.id, body));
