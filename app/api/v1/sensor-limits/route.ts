import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getSensorLimits, setSensorLimits } from '@/lib/services/sensors/limits';

export const GET = route(endpoints.getSensorLimits, ({ actor }) => getSensorLimits(actor));
export const PATCH = route(endpoints.setSensorLimits, ({ actor, body }) => setSensorLimits(actor, body));
