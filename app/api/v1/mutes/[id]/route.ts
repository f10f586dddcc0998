import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { endMute } from '@/lib/services/messages/mutes';

export const DELETE = route(endpoints.endMute, ({ actor, params }) => endMute(actor, params.id));
