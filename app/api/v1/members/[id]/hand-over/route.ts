import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { handOver } from '@/lib/services/cellars/members';

export const POST = route(endpoints.handOver, ({ actor, params, body }) => handOver(actor, params.id, body.passphrase));
