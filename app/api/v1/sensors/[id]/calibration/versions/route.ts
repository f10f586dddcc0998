import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { calibrate } from '@/lib/services/sensors/calibration/versions';

export const POST = route(endpoints.calibrate, ({ actor, params, body }) => calibrate(actor, params.id, body));
