import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { archiveMust } from '@/lib/services/musts/archive';
import { getMust } from '@/lib/services/musts/get';
import { updateMust } from '@/lib/services/musts/update';

export const GET = route(endpoints.getMust, ({ actor, params, query }) => getMust(actor, params.id, query));
export const PATCH = route(endpoints.updateMust, ({ actor, params, body }) => updateMust(actor, params.id, body));
export const DELETE = route(endpoints.archiveMust, ({ actor, params }) => archiveMust(actor, params.id));
