import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { revokeToken } from '@/lib/services/tokens/manage';

export const DELETE = route(endpoints.revokeToken, ({ actor, params }) => revokeToken(actor, params.id));
