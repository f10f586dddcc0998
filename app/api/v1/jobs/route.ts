import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createJob } from '@/lib/services/jobs/create';
import { listJobs } from '@/lib/services/jobs/list';

export const GET = route(endpoints.listJobs, ({ actor, query }) => listJobs(actor, query));
export const POST = route(endpoints.createJob, ({ actor, body }) => createJob(actor, body));
