import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createInvitation, listInvitations } from '@/lib/services/invitations/manage';

export const GET = route(endpoints.listInvitations, ({ actor }) => listInvitations(actor));
export const POST = route(endpoints.createInvitation, ({ actor, body }) => createInvitation(actor, body));
