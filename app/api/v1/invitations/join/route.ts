import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { joinByInvitation } from '@/lib/services/invitations/accept';

export const POST = route(endpoints.joinByInvitation, ({ body }) => joinByInvitation(body));
