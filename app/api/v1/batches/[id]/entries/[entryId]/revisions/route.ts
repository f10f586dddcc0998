import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listRevisions } from '@/lib/services/entries/list-revisions';

export const GET = route(endpoints.listRevisions, ({ actor, params }) => listRevisions(actor, params.id, params.entryId));
