import { fileTypeFromBuffer } from 'file-type';
import sharp from 'sharp';
import { PHOTO_TYPES } from '@/lib/contracts/photos';
import { InvalidError } from '@/lib/errors';
import { turns } from '@/lib/turns';
import { isPlainJpeg } from './plain-jpeg';

const TAKEN: ReadonlySet<string> = new Set(PHOTO_TYPES);
/** A camera's 48 megapixels pass; a few bytes that unfold into a gigabyte do not. */
const MOST_PIXELS = 50_000_000;
const LARGE = { width: 2_048, height: 2_048 };
/** Twice the size in the log (132 × 84), for sharp screens; nothing is cut off. */
const SMALL = { width: 528, height: 336 };
const SECONDS = 15;
/** Pictures unfold in memory: so many at a time, and so many waiting. */
const inTurn = turns({ atOnce: 2, waiting: 8, says: 'Too many photos come in at once. Send it again in a moment.' });

export interface Picture {
  large: Buffer;
  small: Buffer;
  /** Of the large one, px. */
  width: number;
  height: number;
}

const refuse = (says: string) => new InvalidError('This is no photo that can be kept.', { photo: [says] });

/**
 * Reads a photo and writes it anew, twice: turned upright, without where and with
 * what it was taken (EXIF and all else that is not picture), and without whatever
 * else the file may have been.
 * @throws InvalidError where it is no picture, or too large unfolded.
 */
export async function developPicture(bytes: Buffer): Promise<Picture> {
  const type = await fileTypeFromBuffer(bytes).catch(() => undefined);
  if (!type || !TAKEN.has(type.mime)) throw refuse('must be a JPEG, PNG, WebP or AVIF picture');
  return inTurn(async () => {
    const open = () => sharp(bytes, { limitInputPixels: MOST_PIXELS, failOn: 'error', sequentialRead: true, pages: 1 }).timeout({ seconds: SECONDS }).autoOrient();
    try {
      const { width = 0, height = 0 } = await sharp(bytes, { limitInputPixels: MOST_PIXELS }).metadata();
      if (width * height > MOST_PIXELS) throw refuse('is larger than 50 megapixels');
      if (width < 8 || height < 8) throw refuse('is smaller than 8 by 8 pixels');
      const large = await open().resize({ ...LARGE, fit: 'inside', withoutEnlargement: true }).flatten({ background: '#ffffff' }).toColourspace('srgb').jpeg({ quality: 82 }).toBuffer({ resolveWithObject: true });
      const small = await open().resize({ ...SMALL, fit: 'inside', withoutEnlargement: true }).flatten({ background: '#ffffff' }).toColourspace('srgb').jpeg({ quality: 76 }).toBuffer();
      return { large: large.data, small, width: large.info.width, height: large.info.height };
    } catch (error) {
      if (error instanceof InvalidError) throw error;
      const says = error instanceof Error && /pixel limit/i.test(error.message) ? 'is larger than 50 megapixels' : 'cannot be read: the file is damaged or is no picture';
      throw refuse(says);
    }
  });
}

/** A photo that was written anew before, from an archive: as it is where it is a plain JPEG of our size, else as {@link developPicture} does. */
export async function developAgain(bytes: Buffer): Promise<Picture> {
  const anew = await developPicture(bytes);
  if (!isPlainJpeg(bytes)) return anew;
  const { width = 0, height = 0 } = await sharp(bytes).metadata();
  return width === anew.width && height === anew.height ? { ...anew, large: bytes } : anew;
}
