import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getCalibration } from '@/lib/services/sensors/calibration/get';

export const GET = route(endpoints.getCalibration, ({ actor, params }) => getCalibration(actor, params.id));
