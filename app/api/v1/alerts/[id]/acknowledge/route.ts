import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { acknowledgeAlert } from '@/lib/services/alerts/acknowledge';

export const POST = route(endpoints.acknowledgeAlert, ({ actor, params, body }) => acknowledgeAlert(actor, params.id, body));
