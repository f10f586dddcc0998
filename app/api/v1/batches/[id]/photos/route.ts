import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listBatchPhotos } from '@/lib/services/photos/look';

export const GET = route(endpoints.listBatchPhotos, ({ actor, params }) => listBatchPhotos(actor, params.id));
