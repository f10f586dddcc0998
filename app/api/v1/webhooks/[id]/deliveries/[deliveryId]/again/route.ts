import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { deliverAgain } from '@/lib/services/webhooks/manage';

export const POST = route(endpoints.deliverAgain, ({ actor, params }) => deliverAgain(actor, params.id, params.deliveryId));
