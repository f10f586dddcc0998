import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { removeEntry } from '@/lib/services/entries/remove';
import { updateEntry } from '@/lib/services/entries/update';

export const DELETE = route(endpoints.removeEntry, ({ actor, params }) => removeEntry(actor, params.id, params.entryId));
export const PATCH = route(endpoints.updateEntry, ({ actor, params, body }) => updateEntry(actor, params.id, params.entryId, body));
