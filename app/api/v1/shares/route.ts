import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listShares } from '@/lib/services/shares/manage';

export const GET = route(endpoints.listShares, ({ actor }) => listShares(actor, null));
