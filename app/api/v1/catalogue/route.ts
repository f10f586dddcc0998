import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { addToCatalogue } from '@/lib/services/catalogue/add';
import { getCatalogue } from '@/lib/services/catalogue/get';

export const GET = route(endpoints.getCatalogue, ({ actor }) => getCatalogue(actor));
export const POST = route(endpoints.addToCatalogue, ({ actor, body }) => addToCatalogue(actor, body));
