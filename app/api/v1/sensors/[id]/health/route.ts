import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getSensorHealth } from '@/lib/services/sensors/health';

export const GET = route(endpoints.getSensorHealth, ({ actor, params }) => getSensorHealth(actor, params.id));
