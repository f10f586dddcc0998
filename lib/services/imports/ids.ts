import { randomBytes } from 'node:crypto';

const UUID = /[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}/gi;

/**
 * New ids for what an archive brings: nothing that is here already can be named
 * by it. They rise in the order in which they are asked for (RFC 9562, version 7
 * with a counter), so that what came in together goes out in the same order.
 */
export class NewIds {
  private readonly known = new Map<string, string>();
  private count = 0;

  constructor(private readonly now: number) {}

  /** The new id of what the archive calls so; made at the first call. */
  make(old: string): string {
    const before = this.of(old);
    if (before) return before;
    const made = this.next();
    this.known.set(old.toLowerCase(), made);
    return made;
  }

  /** It is here already, as this. */
  is(old: string, here: string): void {
    this.known.set(old.toLowerCase(), here);
  }

  of(old: string): string | undefined {
    return this.known.get(old.toLowerCase());
  }

  /** Texts within a value with each id of the archive as its new one; others stay. */
  within<T>(value: T): T {
    if (typeof value === 'string') return value.replace(UUID, (old) => this.of(old) ?? old) as T;
    if (Array.isArray(value)) return value.map((item: unknown) => this.within(item)) as T;
    if (value === null || typeof value !== 'object') return value;
    return Object.fromEntries(Object.entries(value).map(([name, item]) => [name, this.within<unknown>(item)])) as T;
  }

  /** For what the archive has no name for. */
  next(): string {
    this.count += 1;
    const bytes = randomBytes(16);
    bytes.writeUIntBE(this.now, 0, 6);
    bytes.writeUInt16BE(0x7000 | ((this.count >> 14) & 0xfff), 6);
    bytes.writeUInt16BE(0x8000 | (this.count & 0x3fff), 8);
    const hex = bytes.toString('hex');
    return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-${hex.slice(12, 16)}-${hex.slice(16, 20)}-${hex.slice(20)}`;
  }
}
