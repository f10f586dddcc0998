import { randomUUID } from 'node:crypto';
import { deflateSync, crc32 } from 'node:zlib';
import sharp from 'sharp';
import { beforeAll, describe, expect, it } from 'vitest';
import { Entry, Photo, Tasting } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import { ManualClock } from '@/lib/clock';
import { objectStore } from '@/lib/storage/objects';
import { photoKey } from '@/lib/services/photos/address';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { keepPhoto, removePhoto } from '@/lib/services/photos/keep';
import { listBatchPhotos, openPhoto } from '@/lib/services/photos/look';
import { sweepPhotos } from '@/lib/services/photos/sweep';
import { bottleForm, ciderAt, isoAt } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry, buildMember } from '../support/factories';
import { useObjectStore } from '../support/object-store';

useDatabase();
const store = useObjectStore();
const NOW = Date.now();
const clock = new ManualClock(NOW);

process.env.AUTH_SECRET ??= 'a secret of the tests, long enough to be one';

const jpeg = (width = 1200, height = 900) =>
  sharp({ create: { width, height, channels: 3, background: '#7a5230' } })
    .withExif({ IFD0: { Make: 'Aperture Works', Copyright: 'somebody' }, IFD3: { GPSLatitudeRef: 'N', GPSLatitude: '51/1 30/1 0/1' } })
    .jpeg()
    .toBuffer();

async function scene(role: Actor['role'] = 'hand') {
  const actor = await buildMember(role);
  const batch = await buildBatch({ cellarId: actor.cellarId });
  const entry = await buildEntry(batch, { text: 'Looks clear.', personId: actor.personId });
  return { actor, batch, entry };
}
const addressOf = (url: string) => {
  const query = new URL(url, 'http://house.example').searchParams;
  return { until: Number(query.get('until')), key: query.get('key') ?? '' };
};

describe('a photo on the log', () => {
  it('is kept in two sizes, upright and without where and with what it was taken', async () => {
    const { actor, batch, entry } = await scene();
    const turned = await sharp(await jpeg(1200, 600)).withMetadata({ orientation: 6 }).toBuffer();
    const photo = await keepPhoto(actor, { entry: entry.id }, turned, clock);
    expect(photo).toMatchObject({ entry: entry.id, width: 600, height: 1200, mine: true });
    for (const size of ['small', 'large'] as const) {
      const file = Buffer.from(await openPhoto(photo.id, size, addressOf(photo[size]), clock));
      const metadata = await sharp(file).metadata();
      expect(metadata).toMatchObject({ format: 'jpeg' });
      expect(metadata.exif).toBeUndefined();
      expect(metadata.orientation).toBeUndefined();
      expect(file.includes('Aperture Works')).toBe(false);
    }
    expect((await listBatchPhotos(actor, batch.id, clock)).items.map((item) => item.id)).toEqual([photo.id]);
  });

  it('is shown by an address that ends, and by no other', async () => {
    const { actor, entry } = await scene();
    const photo = await keepPhoto(actor, { entry: entry.id }, await jpeg(), clock);
    const address = addressOf(photo.large);
    await expect(openPhoto(photo.id, 'large', address, new ManualClock(NOW + 31 * 60_000))).rejects.toThrow('no such photo');
    await expect(openPhoto(photo.id, 'small', address, clock)).rejects.toThrow('no such photo');
    await expect(openPhoto(photo.id, 'large', { ...address, until: address.until + 900 }, clock)).rejects.toThrow('no such photo');
    await expect(openPhoto(randomUUID(), 'large', address, clock)).rejects.toThrow('no such photo');
  });

  it('goes from every page at once when it is taken off, and from the store with the next sweep', async () => {
    const { actor, batch, entry } = await scene();
    const photo = await keepPhoto(actor, { entry: entry.id }, await jpeg(), clock);
    await removePhoto(actor, photo.id, clock);
    expect((await listBatchPhotos(actor, batch.id, clock)).items).toEqual([]);
    await expect(openPhoto(photo.id, 'large', addressOf(photo.large), clock)).rejects.toThrow('no such photo');
    const stays = await keepPhoto(actor, { entry: entry.id }, await jpeg(), clock);
    expect(await sweepPhotos({ clock })).toBe(0);
    const later = new ManualClock(NOW + 2 * 3_600_000);
    expect(await sweepPhotos({ clock: later })).toBeGreaterThanOrEqual(2);
    expect(await objectStore().get(photoKey(actor.cellarId, photo.id, 'large'))).toBeNull();
    expect(await objectStore().get(photoKey(actor.cellarId, stays.id, 'large'))).not.toBeNull();
  });

  it('is another cellar’s to nobody, by whatever it is named', async () => {
    const [mine, theirs] = [await scene(), await scene('keeper')];
    await expect(keepPhoto(mine.actor, { entry: theirs.entry.id }, await jpeg(), clock)).rejects.toThrow('no such entry');
    const photo = await keepPhoto(theirs.actor, { entry: theirs.entry.id }, await jpeg(), clock);
    await expect(removePhoto(mine.actor, photo.id, clock)).rejects.toThrow('no such photo');
    await expect(listBatchPhotos(mine.actor, theirs.batch.id, clock)).rejects.toThrow('no such batch');
    await expect(keepPhoto(mine.actor, { lot: randomUUID() }, await jpeg(), clock)).rejects.toThrow('no such lot');
  });

  it('is taken off by who took it or by a brewer, and hung by a guest on an own tasting note alone', async () => {
    const { actor, entry } = await scene();
    const photo = await keepPhoto(actor, { entry: entry.id }, await jpeg(), clock);
    const guest = await buildMember('guest', { cellarId: actor.cellarId });
    const otherHand = await buildMember('hand', { cellarId: actor.cellarId });
    await expect(keepPhoto(guest, { entry: entry.id }, await jpeg(), clock)).rejects.toThrow('you cannot');
    await expect(removePhoto(otherHand, photo.id, clock)).rejects.toThrow('you cannot');
    await removePhoto(await buildMember('brewer', { cellarId: actor.cellarId }), photo.id, clock);
    const brewer = await buildMember('brewer', { cellarId: actor.cellarId });
    const finished = await ciderAt(brewer, { og: 1.03, now: NOW });
    const lot = await bottleBatch(brewer, finished.id, bottleForm({ at: isoAt(NOW) }), clock);
    const own = await Tasting.create({ cellarId: actor.cellarId, lotId: lot.id, personId: guest.personId, at: new Date(NOW) });
    expect(await keepPhoto(guest, { tasting: own.id }, await jpeg(), clock)).toMatchObject({ tasting: own.id });
    await expect(keepPhoto(otherHand, { tasting: own.id }, await jpeg(), clock)).rejects.toThrow('of one’s own');
  });

  it('is not half kept while the store is away: no row, and a sentence', async () => {
    const { actor, entry } = await scene();
    const picture = await jpeg();
    await store.away(() => expect(keepPhoto(actor, { entry: entry.id }, picture, clock)).rejects.toThrow('Photos cannot be kept right now.'));
    expect(await Photo.count({ where: { entryId: entry.id } })).toBe(0);
    expect(await keepPhoto(actor, { entry: entry.id }, picture, clock)).toMatchObject({ entry: entry.id });
  });

  it('goes with its entry', async () => {
    const { actor, entry } = await scene();
    const photo = await keepPhoto(actor, { entry: entry.id }, await jpeg(), clock);
    await Entry.destroy({ where: { id: entry.id } });
    expect(await Photo.findByPk(photo.id)).toBeNull();
  });
});

/** A PNG whose header promises more than its few bytes hold. */
function pngOf(width: number, height: number, data: Buffer): Buffer {
  const chunk = (type: string, body: Buffer) => {
    const head = Buffer.concat([Buffer.from(type), body]);
    const length = Buffer.alloc(4);
    length.writeUInt32BE(body.length);
    const sum = Buffer.alloc(4);
    sum.writeUInt32BE(crc32(head));
    return Buffer.concat([length, head, sum]);
  };
  const header = Buffer.alloc(13);
  header.writeUInt32BE(width, 0);
  header.writeUInt32BE(height, 4);
  header.set([8, 2, 0, 0, 0], 8);
  return Buffer.concat([Buffer.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10]), chunk('IHDR', header), chunk('IDAT', data), chunk('IEND', Buffer.alloc(0))]);
}

describe('files that are no photos', () => {
  let good: Buffer;
  beforeAll(async () => {
    good = await jpeg(64, 64);
  });
  const svg = '<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>';
  const html = '<!doctype html><script>alert(1)</script>';
  const cases: Record<string, () => Buffer | Promise<Buffer>> = {
    nothing: () => Buffer.alloc(0),
    'one byte': () => Buffer.from([0xff]),
    text: () => Buffer.from('just words'),
    'zero bytes': () => Buffer.alloc(4096),
    HTML: () => Buffer.from(html),
    SVG: () => Buffer.from(svg),
    'SVG behind a byte order mark': () => Buffer.from(`\uFEFF${svg}`),
    XML: () => Buffer.from('<?xml version="1.0"?><!DOCTYPE x [<!ENTITY e SYSTEM "file:///etc/passwd">]><x>&e;</x>'),
    PDF: () => Buffer.from('%PDF-1.7\n1 0 obj<</Type/Catalog>>endobj'),
    'a zip': () => Buffer.from([0x50, 0x4b, 3, 4, 20, 0, 0, 0, 8, 0]),
    gzip: () => Buffer.from([0x1f, 0x8b, 8, 0, 0, 0, 0, 0]),
    'a program': () => Buffer.concat([Buffer.from([0x7f, 0x45, 0x4c, 0x46]), Buffer.alloc(100)]),
    GIF: () => Buffer.from('R0lGODlhAQABAIAAAAAAAP///yH5BAEAAAAALAAAAAABAAEAAAIBRAA7', 'base64'),
    TIFF: () => sharp({ create: { width: 64, height: 64, channels: 3, background: '#fff' } }).tiff().toBuffer(),
    'only the first bytes of a JPEG': () => Buffer.from([0xff, 0xd8, 0xff, 0xe0, 0, 16, 0x4a, 0x46, 0x49, 0x46]),
    'a JPEG cut in half': () => good.subarray(0, Math.floor(good.length / 2)),
    'JPEG bytes, then HTML in place of the picture': () => Buffer.concat([good.subarray(0, 20), Buffer.from(html.repeat(50))]),
    'a PNG head, then noise': () => Buffer.concat([Buffer.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10]), Buffer.from(Array.from({ length: 500 }, (_, index) => (index * 7919) % 256))]),
    'a PNG of 100,000 by 100,000 in a few bytes': () => pngOf(100_000, 100_000, deflateSync(Buffer.alloc(1_000))),
    'a PNG of 8,000 by 8,000 of nothing': () => pngOf(8_000, 8_000, deflateSync(Buffer.alloc(8_000 * 3 * 8_000 + 8_000), { level: 9 })),
    'a PNG with a width of zero': () => pngOf(0, 100, deflateSync(Buffer.alloc(10))),
    'a PNG of 2^31 wide': () => pngOf(0x7fffffff, 1, deflateSync(Buffer.alloc(10))),
    'a picture of one pixel': () => sharp({ create: { width: 1, height: 1, channels: 3, background: '#fff' } }).png().toBuffer(),
    'WebP named and empty': () => Buffer.from('RIFF\x1a\0\0\0WEBPVP8L\0\0\0\0', 'latin1'),
  };
  for (const [name, make] of Object.entries(cases)) {
    it(`are refused with a reason: ${name}`, async () => {
      const { actor, entry } = await scene();
      const before = process.memoryUsage().rss;
      await expect(keepPhoto(actor, { entry: entry.id }, await make(), clock)).rejects.toMatchObject({ code: 'invalid', fields: { photo: [expect.stringMatching(/^(must be|is larger|is smaller|cannot be read)/)] } });
      expect(process.memoryUsage().rss - before).toBeLessThan(300e6);
      expect(await Photo.count({ where: { entryId: entry.id } })).toBe(0);
    });
  }

  it('lose what they were besides: a picture with HTML behind it is a picture alone', async () => {
    const { actor, entry } = await scene();
    const both = Buffer.concat([good, Buffer.from(html)]);
    const photo = await keepPhoto(actor, { entry: entry.id }, both, clock);
    const file = Buffer.from(await openPhoto(photo.id, 'large', addressOf(photo.large), clock));
    expect(file.includes('<script>')).toBe(false);
  });
});
