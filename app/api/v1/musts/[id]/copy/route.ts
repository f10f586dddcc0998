import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { copyMust } from '@/lib/services/musts/copy';

export const POST = route(endpoints.copyMust, ({ actor, params, body }) => copyMust(actor, params.id, body));
