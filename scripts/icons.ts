import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import sharp from 'sharp';

/** Draws the icons of the installed app from the mark; run it again when the mark changes. */
const MARK = 'M12 2h8 M13 2v6.2C7 9.6 4 13.6 4 18.4V27c0 1.7 1.3 3 3 3h18c1.7 0 3-1.3 3-3v-8.6c0-4.8-3-8.8-9-10.2V2';
const LEVELS = 'M5 17.5h22 M5 22h22 M5 25.2h22 M5 27.6h22';
const SHEET = '#F1F5ED';
const INK = '#14201A';
const AMBER = '#D99B3C';
const PUBLIC = join(import.meta.dirname, '../public');

/** The mark with amber drink in it, `share` of the square wide. */
function drawn(size: number, share: number, ground: string | null): string {
  const scale = (size * share) / 32;
  const at = (size - 32 * scale) / 2;
  return `<svg xmlns="http://www.w3.org/2000/svg" width="${size}" height="${size}">${ground ? `<rect width="${size}" height="${size}" fill="${ground}"/>` : ''}
    <g transform="translate(${at} ${at}) scale(${scale})" fill="none" stroke="${ground ? INK : '#fff'}" stroke-linejoin="round">
      ${ground ? `<path d="M4.2 17.500h23.6V27c0 1.700-1.300 3-3 3H7c-1.700 0-3-1.300-3-3Z" fill="${AMBER}" stroke="none"/>` : ''}
      <path d="${MARK}" stroke-width="2"/><path d="${LEVELS}" stroke-width="1.7"/>
    </g></svg>`;
}

const ICONS = [
  { file: 'icon-192.png', svg: drawn(192, 0.74, SHEET) },
  { file: 'icon-512.png', svg: drawn(512, 0.74, SHEET) },
  // A mask may cut down to the middle 80 % (W3C manifest, maskable icons).
  { file: 'icon-maskable-192.png', svg: drawn(192, 0.54, SHEET) },
  { file: 'icon-maskable-512.png', svg: drawn(512, 0.54, SHEET) },
  { file: 'apple-touch-icon.png', svg: drawn(180, 0.66, SHEET) },
  // Phones take only its shape.
  { file: 'badge-96.png', svg: drawn(96, 0.86, null) },
];

for (const { file, svg } of ICONS) writeFileSync(join(PUBLIC, file), await sharp(Buffer.from(svg)).png({ compressionLevel: 9, palette: true }).toBuffer());
