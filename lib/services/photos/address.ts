import { createHmac, timingSafeEqual } from 'node:crypto';
import { authSecret } from '@/lib/config/env';
import type { PhotoSize } from '@/lib/contracts/photos';

/** An address holds at least so long and at most twice: those made within one span are the same, so that browsers keep the picture. */
const SPAN_S = 900;

/** Where a photo's file lies in the store. */
export const photoKey = (cellarId: string, photoId: string, size: PhotoSize) => `photos/${cellarId}/${photoId}.${size}.jpg`;

const signature = (photoId: string, size: PhotoSize, until: number) => createHmac('sha256', authSecret()).update(`photo:${photoId}:${size}:${until}`).digest();

/** An address that shows the photo to whoever has it, until it ends. `now` in ms. */
export function photoAddress(photoId: string, size: PhotoSize, now: number): string {
  const until = (Math.floor(now / 1000 / SPAN_S) + 2) * SPAN_S;
  return `/api/v1/photos/${photoId}/${size}?until=${until}&key=${signature(photoId, size, until).toString('base64url')}`;
}

/** Whether an address is ours and has not ended. */
export function isPhotoAddress(photoId: string, size: PhotoSize, until: number, key: string, now: number): boolean {
  const given = Buffer.from(key, 'base64url');
  const right = signature(photoId, size, until);
  return given.length === right.length && timingSafeEqual(given, right) && until * 1000 > now && until * 1000 <= now + 3 * SPAN_S * 1000;
}
