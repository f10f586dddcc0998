import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { removeVersion } from '@/lib/services/sensors/calibration/versions';

export const DELETE = route(endpoints.removeCalibration, ({ actor, params }) => removeVersion(actor, params.id, params.version));
