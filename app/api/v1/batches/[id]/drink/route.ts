import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getDrink } from '@/lib/services/drink/get';

export const GET = route(endpoints.getDrink, ({ actor, params }) => getDrink(actor, params.id));
