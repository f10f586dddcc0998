import { endpoints } from '@/lib/contracts/endpoints';
import { fileResponse } from '@/lib/http/file';
import { route } from '@/lib/http/route';
import { openPhoto } from '@/lib/services/photos/look';

/** A picture and nothing else: its type is said, not guessed, and no script of it could run. */
const HEADERS = { 'cache-control': 'private, max-age=900, immutable', 'x-content-type-options': 'nosniff', 'content-security-policy': "default-src 'none'; sandbox", 'cross-origin-resource-policy': 'same-origin' };

export const GET = route(endpoints.openPhoto, async ({ params, query }) => fileResponse(new Uint8Array(await openPhoto(params.id, params.size, query)), { type: 'image/jpeg', filename: `${params.id}.jpg`, show: true, headers: new Headers(HEADERS) }));
