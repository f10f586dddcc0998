/** APP0, tables, frames, scans: what a picture needs and nothing that could say more. */
const ALLOWED: ReadonlySet<number> = new Set([0xe0, 0xdb, 0xc0, 0xc1, 0xc2, 0xc4, 0xdd, 0xda]);
const SCAN = 0xda;
const END = 0xd9;

/** Where the next marker is after a scan's coded picture; -1: nowhere. */
function afterScan(bytes: Buffer, from: number): number {
  for (let at = bytes.indexOf(0xff, from); at !== -1 && at + 1 < bytes.length; at = bytes.indexOf(0xff, at + 1)) {
    const next = bytes[at + 1]!;
    if (next !== 0 && !(next >= 0xd0 && next <= 0xd7)) return at;
  }
  return -1;
}

/**
 * Whether a file is a JPEG and nothing else: no EXIF, no profile, no comment, and
 * nothing behind its end (ITU-T T.81, annex B). One that we wrote is; it may be
 * kept as it is.
 */
export function isPlainJpeg(bytes: Buffer): boolean {
  if (bytes.length < 4 || bytes[0] !== 0xff || bytes[1] !== 0xd8) return false;
  let at = 2;
  while (at + 1 < bytes.length) {
    if (bytes[at] !== 0xff) return false;
    const marker = bytes[at + 1]!;
    if (marker === END) return at + 2 === bytes.length;
    if (!ALLOWED.has(marker) || at + 3 >= bytes.length) return false;
    at += 2 + bytes.readUInt16BE(at + 2);
    if (marker === SCAN) at = afterScan(bytes, at);
    if (at === -1) return false;
  }
  return false;
}
