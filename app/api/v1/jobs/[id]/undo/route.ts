import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { undoJob } from '@/lib/services/jobs/done';

export const POST = route(endpoints.undoJob, ({ actor, params }) => undoJob(actor, params.id));
