import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { lookAtInvitation } from '@/lib/services/invitations/accept';

export const POST = route(endpoints.lookAtInvitation, ({ body }) => lookAtInvitation(body.token));
