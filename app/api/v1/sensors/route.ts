import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createSensor } from '@/lib/services/sensors/create';
import { listSensors } from '@/lib/services/sensors/list';

export const GET = route(endpoints.listSensors, ({ actor, query }) => listSensors(actor, query));
export const POST = route(endpoints.createSensor, ({ actor, body }) => createSensor(actor, body));
