import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getAssessment } from '@/lib/services/batches/get-judgement';

export const GET = route(endpoints.getAssessment, ({ actor, params, query }) => getAssessment(actor, params.id, query));
