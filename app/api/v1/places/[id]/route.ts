import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { removePlace, updatePlace } from '@/lib/services/places/write';

export const PATCH = route(endpoints.updatePlace, ({ actor, params, body }) => updatePlace(actor, params.id, body));
export const DELETE = route(endpoints.removePlace, ({ actor, params }) => removePlace(actor, params.id));
