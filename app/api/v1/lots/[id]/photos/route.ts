import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listLotPhotos } from '@/lib/services/photos/look';

export const GET = route(endpoints.listLotPhotos, ({ actor, params }) => listLotPhotos(actor, params.id));
