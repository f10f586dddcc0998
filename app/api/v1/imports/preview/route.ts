import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { previewImport } from '@/lib/services/imports/preview';

export const POST = route(endpoints.previewImport, ({ actor, body }) => previewImport(actor, body));
