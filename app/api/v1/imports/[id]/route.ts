import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { undoImport } from '@/lib/services/imports/undo';

export const DELETE = route(endpoints.undoImport, ({ actor, params }) => undoImport(actor, params.id));
