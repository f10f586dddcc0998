import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { offsetSensor } from '@/lib/services/sensors/calibration/versions';

export const POST = route(endpoints.offsetSensor, ({ actor, params, body }) => offsetSensor(actor, params.id, body));
