import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { solveSheet } from '@/lib/services/musts/reckon';

export const POST = route(endpoints.solveMust, ({ actor, body }) => solveSheet(actor, body));
