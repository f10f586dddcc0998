import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listFinings } from '@/lib/services/finings/list';
import { startFining } from '@/lib/services/finings/start';

export const GET = route(endpoints.listFinings, ({ actor, params }) => listFinings(actor, params.id));
export const POST = route(endpoints.startFining, ({ actor, params, body }) => startFining(actor, params.id, body));
