import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listAlerts } from '@/lib/services/alerts/list';

export const GET = route(endpoints.listAlerts, ({ actor, query }) => listAlerts(actor, query));
