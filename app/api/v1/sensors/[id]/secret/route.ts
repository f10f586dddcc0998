import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { rotateSensor } from '@/lib/services/sensors/rotate';

export const POST = route(endpoints.rotateSensor, ({ actor, params }) => rotateSensor(actor, params.id));
