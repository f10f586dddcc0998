import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listSensorHealth } from '@/lib/services/sensors/health';

export const GET = route(endpoints.listSensorHealth, ({ actor }) => listSensorHealth(actor));
