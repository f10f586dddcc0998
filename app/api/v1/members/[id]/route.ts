import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { changeRole, removeMember } from '@/lib/services/cellars/members';

export const PATCH = route(endpoints.updateMember, ({ actor, params, body }) => changeRole(actor, params.id, body.role));
export const DELETE = route(endpoints.removeMember, ({ actor, params }) => removeMember(actor, params.id));
