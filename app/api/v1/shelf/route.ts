import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getShelf } from '@/lib/services/shelf/get';

export const GET = route(endpoints.getShelf, ({ actor, query }) => getShelf(actor, query));
