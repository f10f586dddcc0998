import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { takeJob } from '@/lib/services/jobs/take';

export const POST = route(endpoints.takeJob, ({ actor, params, body }) => takeJob(actor, params.id, body.taken));
