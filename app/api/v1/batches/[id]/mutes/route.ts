import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { muteBatch } from '@/lib/services/messages/mutes';

export const POST = route(endpoints.createMute, ({ actor, params, body }) => muteBatch(actor, params.id, body));
