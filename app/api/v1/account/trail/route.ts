import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listAccountTrail } from '@/lib/services/audit/list';

export const GET = route(endpoints.listAccountTrail, ({ session, query }) => listAccountTrail(session.personId, query));
