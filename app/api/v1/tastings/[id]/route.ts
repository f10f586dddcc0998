import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { removeTasting } from '@/lib/services/tastings/write';

export const DELETE = route(endpoints.removeTasting, ({ actor, params }) => removeTasting(actor, params.id));
