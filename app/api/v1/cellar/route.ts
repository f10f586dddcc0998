import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { deleteCellar, updateCellar } from '@/lib/services/cellars/own';

export const PATCH = route(endpoints.updateCellar, ({ actor, body }) => updateCellar(actor, body));
export const DELETE = route(endpoints.deleteCellar, ({ actor, body }) => deleteCellar(actor, body));
