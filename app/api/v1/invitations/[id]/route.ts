import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { revokeInvitation } from '@/lib/services/invitations/manage';

export const DELETE = route(endpoints.revokeInvitation, ({ actor, params }) => revokeInvitation(actor, params.id));
