import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { removeFromCatalogue, updateCatalogue } from '@/lib/services/catalogue/change';

export const PATCH = route(endpoints.updateCatalogue, ({ actor, params, body }) => updateCatalogue(actor, params.id, body));
export const DELETE = route(endpoints.removeFromCatalogue, ({ actor, params }) => removeFromCatalogue(actor, params.id));
