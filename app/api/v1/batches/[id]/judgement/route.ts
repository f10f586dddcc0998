import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getJudgement } from '@/lib/services/batches/get-judgement';

export const GET = route(endpoints.getJudgement, ({ actor, params, query }) => getJudgement(actor, params.id, query));
