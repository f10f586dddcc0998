import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getSurroundings } from '@/lib/services/batches/surroundings';

export const GET = route(endpoints.getSurroundings, ({ actor, params }) => getSurroundings(actor, params.id));
