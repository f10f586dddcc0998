import { randomBytes } from 'node:crypto';
import { mkdir, open, readdir, readFile, rename, rm } from 'node:fs/promises';
import { join } from 'node:path';

export interface StoredMail {
  id: string;
  received_at: string;
  /** As the server was told, which may differ from the headers. */
  envelope: { from: string; to: string[] };
  from: string;
  to: string;
  subject: string;
  message_id: string | null;
  in_reply_to: string | null;
  text: string;
  html: string | null;
}

/** Older ones make way, so that a demo left on for months does not fill the disk. */
const KEPT = 2_000;

/** Mails as files, one each, so that they outlive a restart. */
export class MailStore {
  private mails: StoredMail[] = [];

  private constructor(private readonly folder: string) {}

  static async open(folder: string): Promise<MailStore> {
    await mkdir(folder, { recursive: true });
    const store = new MailStore(folder);
    for (const file of (await readdir(folder)).filter((name) => name.endsWith('.json')).sort()) {
      // A file half written by a machine that lost power is no mail.
      const mail = await readFile(join(folder, file), 'utf8').then(JSON.parse, () => null).catch(() => null);
      if (mail) store.mails.push(mail as StoredMail);
    }
    return store;
  }

  /** Newest first. */
  list(): StoredMail[] {
    return this.mails.toReversed();
  }

  get(id: string): StoredMail | null {
    return this.mails.find((mail) => mail.id === id) ?? null;
  }

  /** Fulfils once it is on the disk. */
  async add(mail: Omit<StoredMail, 'id' | 'received_at'>, at: Date): Promise<StoredMail> {
    const stored: StoredMail = { id: `${String(at.getTime()).padStart(14, '0')}-${randomBytes(4).toString('hex')}`, received_at: at.toISOString(), ...mail };
    const path = this.path(stored.id);
    const file = await open(`${path}.part`, 'w');
    try {
      await file.writeFile(JSON.stringify(stored, null, 2));
      await file.sync();
    } finally {
      await file.close();
    }
    await rename(`${path}.part`, path);
    this.mails.push(stored);
    while (this.mails.length > KEPT) await rm(this.path(this.mails.shift()!.id), { force: true });
    return stored;
  }

  async clear(): Promise<void> {
    const all = this.mails;
    this.mails = [];
    await Promise.all(all.map((mail) => rm(this.path(mail.id), { force: true })));
  }

  private path(id: string): string {
    return join(this.folder, `${id}.json`);
  }
}
