import { deflateSync, crc32 } from 'node:zlib';
import sharp from 'sharp';
import { beforeAll, describe, expect, it, vi } from 'vitest';
import { Cellar, Photo } from '@/db/models';
import { inTransaction } from '@/db/client';
import { forgetCellar } from '@/db/queries/cellars';
import { ManualClock } from '@/lib/clock';
import { endpoints } from '@/lib/contracts/endpoints';
import { PHOTO_LIMIT_BYTES } from '@/lib/contracts/photos';
import { developPicture } from '@/lib/services/photos/picture';
import { keepPhoto } from '@/lib/services/photos/keep';
import { sweepPhotos } from '@/lib/services/photos/sweep';
import { objectStore } from '@/lib/storage/objects';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry, buildMember } from '../support/factories';
import { useObjectStore } from '../support/object-store';
import { askRoute } from '../support/routes';
import { sessionCookie } from '../support/web';

vi.mock('server-only', () => ({}));
useDatabase();
const store = useObjectStore();
const HOUR = 3_600_000;

let plain: Buffer;
let located: Buffer;
beforeAll(async () => {
  const picture = sharp({ create: { width: 320, height: 240, channels: 3, background: '#7a5230' } });
  plain = await picture.clone().jpeg().toBuffer();
  located = await picture.clone().withExif({ IFD0: { Make: 'Aperture Works' }, IFD3: { GPSLatitudeRef: 'N', GPSLatitude: '51/1 30/1 0/1' } }).jpeg().toBuffer();
});

async function scene() {
  const hand = await buildMember('hand');
  const batch = await buildBatch({ cellarId: hand.cellarId });
  const entry = await buildEntry(batch, { text: 'clear', personId: hand.personId });
  return { hand, batch, entry, cookie: (await sessionCookie(hand.personId)).cookie };
}
const files = async (cellarId: string) => {
  const found: string[] = [];
  for await (const { key } of objectStore().list(`photos/${cellarId}/`)) found.push(key);
  return found;
};
const send = (cookie: string, entry: string, body: BodyInit, type = 'image/jpeg') => askRoute(endpoints.keepPhoto, { cookie, query: `entry=${entry}`, body, headers: { 'content-type': type } });

describe('a photo over HTTP', () => {
  it('goes in as it is and comes back as a JPEG that no browser takes for anything else', async () => {
    const { entry, cookie } = await scene();
    const answer = await send(cookie, entry.id, new Uint8Array(located));
    expect(answer.status).toBe(201);
    const photo = (await answer.json()) as { id: string; large: string; small: string };
    for (const size of ['large', 'small'] as const) {
      const file = await askRoute(endpoints.openPhoto, { params: { id: photo.id, size }, query: photo[size].split('?')[1]! });
      expect(file.status).toBe(200);
      expect(Object.fromEntries(file.headers)).toMatchObject({ 'content-type': 'image/jpeg', 'x-content-type-options': 'nosniff', 'content-security-policy': expect.stringContaining("default-src 'none'") });
      const bytes = Buffer.from(await file.arrayBuffer());
      expect(bytes.includes('Aperture Works')).toBe(false);
      expect((await sharp(bytes).metadata()).exif).toBeUndefined();
    }
  });

  const form = (part: Buffer | string, type = 'image/jpeg') => Buffer.concat([Buffer.from(`--x\r\ncontent-disposition: form-data; name="photo"; filename="../../a.html"\r\ncontent-type: ${type}\r\n\r\n`), Buffer.from(part as string), Buffer.from('\r\n--x--\r\n')]);
  const HTML = '<!doctype html><script>alert(1)</script>';
  const SVG = '<svg xmlns="http://www.w3.org/2000/svg" onload="alert(1)"/>';
  const cases: Record<string, () => [body: Buffer, type?: string]> = {
    'a multipart form with a photo': () => [form(plain), 'multipart/form-data; boundary=x'],
    'a multipart form with HTML': () => [form(HTML, 'text/html'), 'multipart/form-data; boundary=x'],
    'a form that says it is a photo': () => [form(plain), 'image/jpeg'],
    'HTML that says it is a photo': () => [Buffer.from(HTML)],
    'SVG that says it is a photo': () => [Buffer.from(SVG)],
    'SVG that says so': () => [Buffer.from(SVG), 'image/svg+xml'],
    'a photo in base64': () => [Buffer.from(plain.toString('base64'))],
    'a data address': () => [Buffer.from(`data:image/jpeg;base64,${plain.toString('base64')}`)],
    'JSON around it': () => [Buffer.from(JSON.stringify({ photo: plain.toString('base64') })), 'application/json'],
    'HTML before a photo': () => [Buffer.concat([Buffer.from(HTML), plain])],
    'a photo cut short': () => [plain.subarray(0, 200)],
    'nothing': () => [Buffer.alloc(0)],
    'one byte more than may be': () => [Buffer.concat([plain, Buffer.alloc(PHOTO_LIMIT_BYTES)])],
    'a GIF': () => [Buffer.from('R0lGODlhAQABAIAAAAAAAP///yH5BAEAAAAALAAAAAABAAEAAAIBRAA7', 'base64'), 'image/gif'],
    'a PDF with a photo in it': () => [Buffer.concat([Buffer.from('%PDF-1.7\n'), plain]), 'application/pdf'],
    'a zip with a photo in it': () => [Buffer.concat([Buffer.from('504b0304', 'hex'), plain]), 'application/zip'],
    'an animation of frames that never end': () => [pngOf(40_000, 40_000)],
    'an icon': () => [Buffer.from('00000100010010100000010020006804000016000000', 'hex'), 'image/x-icon'],
    'a script behind a hash bang': () => [Buffer.from('#!/bin/sh\nid\n')],
    'a TIFF head': () => [Buffer.from('49492a0008000000', 'hex'), 'image/tiff'],
  };
  it(`that is none is refused with a reason, ${Object.keys(cases).length} times, and leaves nothing in the store`, async () => {
    expect(Object.keys(cases).length).toBeGreaterThanOrEqual(20);
    const { hand, entry, cookie } = await scene();
    for (const [what, make] of Object.entries(cases)) {
      const [body, type] = make();
      const answer = await send(cookie, entry.id, new Uint8Array(body), type);
      expect([413, 415, 422], `${what}: ${answer.status}`).toContain(answer.status);
      expect(((await answer.json()) as { title: string }).title.length, what).toBeGreaterThan(5);
    }
    expect(await Photo.count({ where: { cellarId: hand.cellarId } })).toBe(0);
    expect(await files(hand.cellarId)).toEqual([]);
  });
});

/** A PNG that promises so many pixels in a few bytes. `colour`: its bytes a pixel and PNG's number for it. */
function pngOf(width: number, height: number, { kind, depth } = { kind: 2, depth: 8 }): Buffer {
  const chunk = (type: string, body: Buffer) => {
    const head = Buffer.concat([Buffer.from(type), body]);
    const [length, sum] = [Buffer.alloc(4), Buffer.alloc(4)];
    length.writeUInt32BE(body.length);
    sum.writeUInt32BE(crc32(head));
    return Buffer.concat([length, head, sum]);
  };
  const header = Buffer.alloc(13);
  header.writeUInt32BE(width, 0);
  header.writeUInt32BE(height, 4);
  header.set([depth, kind, 0, 0, 0], 8);
  const palette = kind === 3 ? [chunk('PLTE', Buffer.alloc(3))] : [];
  return Buffer.concat([Buffer.from('89504e470d0a1a0a', 'hex'), chunk('IHDR', header), ...palette, chunk('IDAT', deflateSync(Buffer.alloc(2_000_000), { level: 9 })), chunk('IEND', Buffer.alloc(0))]);
}

describe('a few bytes that unfold', () => {
  const SIZES = [[10_000, 10_000], [30_000, 30_000], [100_000, 1_000], [7_072, 7_072], [65_535, 65_535]] as const;
  const KINDS = [{ kind: 0, depth: 1 }, { kind: 0, depth: 8 }, { kind: 2, depth: 8 }, { kind: 6, depth: 16 }, { kind: 3, depth: 8 }] as const;
  it(`are refused by what they promise, ${SIZES.length * KINDS.length} times, in little memory and time`, async () => {
    expect(SIZES.length * KINDS.length).toBeGreaterThanOrEqual(20);
    const before = process.memoryUsage().rss;
    for (const [width, height] of SIZES) {
      for (const kind of KINDS) {
        const from = performance.now();
        await expect(developPicture(pngOf(width, height, kind)), `${width} × ${height}, ${JSON.stringify(kind)}`).rejects.toMatchObject({ code: 'invalid', fields: { photo: [expect.stringMatching(/megapixels|cannot be read/)] } });
        expect(performance.now() - from).toBeLessThan(5_000);
      }
    }
    expect(process.memoryUsage().rss - before).toBeLessThan(400e6);
  });
});

describe('a cellar that is deleted', () => {
  it('takes its photos out of the store with the next sweep, and again where the store was away', async () => {
    const gone = await scene();
    const stays = await scene();
    await keepPhoto(gone.hand, { entry: gone.entry.id }, plain);
    await keepPhoto(gone.hand, { entry: gone.entry.id }, plain);
    await keepPhoto(stays.hand, { entry: stays.entry.id }, plain);
    expect(await files(gone.hand.cellarId)).toHaveLength(4);
    await inTransaction((transaction) => forgetCellar(gone.hand.cellarId, transaction));
    expect(await Cellar.findByPk(gone.hand.cellarId)).toBeNull();
    const later = new ManualClock(Date.now() + 2 * HOUR);
    await store.away(() => expect(sweepPhotos({ clock: later })).rejects.toThrow());
    expect(await files(gone.hand.cellarId)).toHaveLength(4);
    await sweepPhotos({ clock: later });
    expect(await files(gone.hand.cellarId)).toEqual([]);
    expect(await files(stays.hand.cellarId)).toHaveLength(2);
  });
});
