import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { undoOpening } from '@/lib/services/lots/open';

export const DELETE = route(endpoints.undoOpening, ({ actor, params }) => undoOpening(actor, params.id, params.openingId));
