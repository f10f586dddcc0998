import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { removePoint } from '@/lib/services/sensors/calibration/points';

export const DELETE = route(endpoints.removeCalibrationPoint, ({ actor, params }) => removePoint(actor, params.id, params.pointId));
