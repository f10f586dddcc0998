import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { dropJob, updateJob } from '@/lib/services/jobs/change';

export const PATCH = route(endpoints.updateJob, ({ actor, params, body }) => updateJob(actor, params.id, body));
export const DELETE = route(endpoints.dropJob, ({ actor, params }) => dropJob(actor, params.id));
