import { endpoints } from '@/lib/contracts/endpoints';
import { PHOTO_LIMIT_BYTES } from '@/lib/contracts/photos';
import { readBytes } from '@/lib/http/body';
import { route } from '@/lib/http/route';
import { keepPhoto } from '@/lib/services/photos/keep';

export const POST = route(endpoints.keepPhoto, async ({ actor, query, request }) => keepPhoto(actor, query, Buffer.from(await readBytes(request, PHOTO_LIMIT_BYTES))));
