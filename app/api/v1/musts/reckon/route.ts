import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { reckonSheet } from '@/lib/services/musts/reckon';

export const POST = route(endpoints.reckonMust, ({ actor, body }) => reckonSheet(actor, body.sheet));
