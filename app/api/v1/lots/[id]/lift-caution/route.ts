import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { liftCaution } from '@/lib/services/lots/lift';

export const POST = route(endpoints.liftCaution, ({ actor, params, body }) => liftCaution(actor, params.id, body));
