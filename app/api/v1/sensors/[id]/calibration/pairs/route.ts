import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { pairPoint } from '@/lib/services/sensors/calibration/points';

export const POST = route(endpoints.pairCalibrationPoint, ({ actor, params, body }) => pairPoint(actor, params.id, body.entry_id));
