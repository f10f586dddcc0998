import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { resolveAlert } from '@/lib/services/alerts/resolve';

export const POST = route(endpoints.resolveAlert, ({ actor, params, body }) => resolveAlert(actor, params.id, body));
