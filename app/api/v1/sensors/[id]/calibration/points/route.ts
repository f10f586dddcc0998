import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { addPoint } from '@/lib/services/sensors/calibration/points';

export const POST = route(endpoints.addCalibrationPoint, ({ actor, params, body }) => addPoint(actor, params.id, body));
