import { Op } from 'sequelize';
import { Photo } from '@/db/models';
import { systemClock, type Clock } from '@/lib/clock';
import { objectStore } from '@/lib/storage/objects';

/** Younger files may belong to a photo that is being kept right now. */
const SETTLED_MS = 3_600_000;
const AT_ONCE = 500;

/** Takes away files whose photo is gone: taken off, or with its batch. Returns how many. */
export async function sweepPhotos({ clock = systemClock }: { clock?: Clock } = {}): Promise<number> {
  const store = objectStore();
  const before = clock.now() - SETTLED_MS;
  let swept = 0;
  let keys: { key: string; id: string }[] = [];
  const drop = async () => {
    const kept = new Set((await Photo.findAll({ attributes: ['id'], where: { id: keys.map(({ id }) => id), removedAt: { [Op.is]: null } }, raw: true })).map(({ id }) => id));
    const gone = keys.filter(({ id }) => !kept.has(id)).map(({ key }) => key);
    if (gone.length > 0) await store.remove(gone);
    swept += gone.length;
    keys = [];
  };
  for await (const { key, at } of store.list('photos/')) {
    const id = /\/([0-9a-f-]{36})\.(?:small|large)\.jpg$/.exec(key)?.[1];
    if (!id || at.getTime() > before) continue;
    keys.push({ key, id });
    if (keys.length >= AT_ONCE) await drop();
  }
  if (keys.length > 0) await drop();
  return swept;
}
