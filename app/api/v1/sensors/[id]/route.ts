import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getSensor } from '@/lib/services/sensors/get';
import { removeSensor } from '@/lib/services/sensors/remove';
import { updateSensor } from '@/lib/services/sensors/update';

export const GET = route(endpoints.getSensor, ({ actor, params }) => getSensor(actor, params.id));
export const PATCH = route(endpoints.updateSensor, ({ actor, params, body }) => updateSensor(actor, params.id, body));
export const DELETE = route(endpoints.removeSensor, ({ actor, params }) => removeSensor(actor, params.id));
