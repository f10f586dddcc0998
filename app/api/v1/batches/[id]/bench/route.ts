import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getBench } from '@/lib/services/bench/get';
import { judge } from '@/lib/services/bench/judge';

export const GET = route(endpoints.getBench, ({ actor, params }) => getBench(actor, params.id));
export const POST = route(endpoints.judgeBench, ({ actor, params, body }) => judge(actor, params.id, body));
