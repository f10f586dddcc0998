import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { createEntry } from '@/lib/services/entries/create';
import { listEntries } from '@/lib/services/entries/list';

export const GET = route(endpoints.listEntries, ({ actor, params, query }) => listEntries(actor, params.id, query));
export const POST = route(endpoints.createEntry, ({ actor, params, body }) => createEntry(actor, params.id, body));
