import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { doJob } from '@/lib/services/jobs/done';

export const POST = route(endpoints.doJob, ({ actor, params, body }) => doJob(actor, params.id, body.at ?? null));
