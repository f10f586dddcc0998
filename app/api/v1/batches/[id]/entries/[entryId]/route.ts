import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { removeEntry } from '@/lib/services/entries/remove';

export const DELETE = route(endpoints.removeEntry, ({ actor, params }) => removeEntry(actor, params.id, params.entryId));
