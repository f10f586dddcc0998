import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { revokeShare } from '@/lib/services/shares/manage';

export const DELETE = route(endpoints.revokeShare, ({ actor, params }) => revokeShare(actor, params.id));
