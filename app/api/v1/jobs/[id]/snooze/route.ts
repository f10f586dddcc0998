import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { snoozeJob } from '@/lib/services/jobs/change';

export const POST = route(endpoints.snoozeJob, ({ actor, params, body }) => snoozeJob(actor, params.id, body.until));
