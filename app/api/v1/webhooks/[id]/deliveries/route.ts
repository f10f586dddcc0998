import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listDeliveries } from '@/lib/services/webhooks/manage';

export const GET = route(endpoints.listDeliveries, ({ actor, params }) => listDeliveries(actor, params.id));
