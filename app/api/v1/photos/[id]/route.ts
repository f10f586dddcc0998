import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { removePhoto } from '@/lib/services/photos/keep';

export const DELETE = route(endpoints.removePhoto, ({ actor, params }) => removePhoto(actor, params.id));
