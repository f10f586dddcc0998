import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getFamily } from '@/lib/services/family/get';

export const GET = route(endpoints.getFamily, ({ actor, params }) => getFamily(actor, params.id));
