import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { keepPhoto } from '@/lib/services/photos/keep';

export const POST = route(endpoints.keepPhoto, ({ actor, query, file }) => keepPhoto(actor, query, Buffer.from(file)));
