import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listMembers } from '@/lib/services/cellars/list-members';

export const GET = route(endpoints.listMembers, ({ actor }) => listMembers(actor));
