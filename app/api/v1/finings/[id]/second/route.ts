import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { secondDose } from '@/lib/services/finings/second';

export const POST = route(endpoints.secondDose, ({ actor, params, body }) => secondDose(actor, params.id, body));
