import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { removeDevice } from '@/lib/services/push/devices';

export const DELETE = route(endpoints.removeDevice, ({ session, params }) => removeDevice(session.personId, params.id));
