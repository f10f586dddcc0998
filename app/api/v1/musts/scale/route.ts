import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { scaleSheetTo } from '@/lib/services/musts/reckon';

export const POST = route(endpoints.scaleMust, ({ actor, body }) => scaleSheetTo(actor, body));
