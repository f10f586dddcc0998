import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createPlace, listPlaces } from '@/lib/services/places/write';

export const GET = route(endpoints.listPlaces, ({ actor }) => listPlaces(actor));
export const POST = route(endpoints.createPlace, ({ actor, body }) => createPlace(actor, body));
