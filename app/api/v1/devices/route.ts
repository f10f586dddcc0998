import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createDevice } from '@/lib/services/push/devices';

export const POST = route(endpoints.createDevice, ({ actor, session, body, request }) => createDevice(actor, session.signInId, body, request.headers.get('user-agent') ?? ''));
