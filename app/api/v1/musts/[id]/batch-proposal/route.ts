import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { proposeBatch } from '@/lib/services/musts/propose-batch';

export const GET = route(endpoints.getBatchProposal, ({ actor, params, query }) => proposeBatch(actor, params.id, query));
