import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createToken, listTokens } from '@/lib/services/tokens/manage';

export const GET = route(endpoints.listTokens, ({ actor }) => listTokens(actor));
export const POST = route(endpoints.createToken, ({ actor, body }) => createToken(actor, body));
