import type { Face } from './fonts';

/** A box in points, y downwards. */
export interface Box {
  x: number;
  y: number;
  w: number;
  h: number;
}

/** A line where it will stand, `y` its baseline. */
export interface Placed {
  face: Face;
  size: number;
  text: string;
  x: number;
  y: number;
  w: number;
}

/** Width of a line, points. */
export type Measure = (text: string, face: Face, size: number) => number;

/** Of the size: baseline under the top of a line, and what hangs below it. */
export const ASCENT = 0.78;
export const DESCENT = 0.24;
const LEADING = 0.98;
/** Smaller than this nobody reads; a text that still does not fit goes on getting smaller rather than being cut. */
const STEP = 0.94;
const SMALLEST = 1;

/** A word in as few pieces as it takes, about equally long. Null where even a letter does not fit. */
function breakWord(word: string, width: number, measure: (text: string) => number): string[] | null {
  const letters = [...word];
  for (let count = Math.ceil(measure(word) / width); count <= letters.length; count += 1) {
    const long = Math.ceil(letters.length / count);
    const pieces = Array.from({ length: Math.ceil(letters.length / long) }, (_, index) => letters.slice(index * long, (index + 1) * long).join(''));
    if (pieces.every((piece) => measure(piece) <= width)) return pieces;
  }
  return null;
}

/** Breaks at words; a word that is too long by itself is broken where it has to be. Null where even a letter does not fit. */
export function breakLines(text: string, width: number, measure: (text: string) => number, breakWords: boolean): string[] | null {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(/\s+/).filter(Boolean)) {
    const longer = line === '' ? word : `${line} ${word}`;
    if (measure(longer) <= width) {
      line = longer;
      continue;
    }
    if (line !== '') lines.push(line);
    if (measure(word) <= width) {
      line = word;
      continue;
    }
    const pieces = breakWords ? breakWord(word, width, measure) : null;
    if (!pieces) return null;
    lines.push(...pieces.slice(0, -1));
    line = pieces.at(-1)!;
  }
  if (line !== '') lines.push(line);
  return lines;
}

export interface TextStyle {
  face: Face;
  /** Largest and smallest size wanted, points; below the smallest words are broken. */
  largest: number;
  smallest: number;
  lines: number;
  align: 'left' | 'right' | 'center';
  valign?: 'top' | 'middle' | 'bottom';
}

/** Sets a text into a box at the largest size at which all of it fits. Nothing is ever cut off. */
export function fitText(text: string, box: Box, style: TextStyle, measure: Measure): Placed[] {
  if (text.trim() === '' || box.w <= 0 || box.h <= 0) return [];
  for (let size = style.largest; size >= SMALLEST; size *= STEP) {
    const crowded = size < style.smallest;
    const lines = breakLines(text, box.w, (line) => measure(line, style.face, size), crowded);
    if (!lines || (!crowded && lines.length > style.lines)) continue;
    const height = (lines.length - 1) * size * LEADING + size * (ASCENT + DESCENT);
    if (height > box.h) continue;
    const free = box.h - height;
    const top = box.y + (style.valign === 'bottom' ? free : style.valign === 'middle' ? free / 2 : 0);
    return lines.map((line, index) => {
      const w = measure(line, style.face, size);
      const x = style.align === 'left' ? box.x : style.align === 'right' ? box.x + box.w - w : box.x + (box.w - w) / 2;
      return { face: style.face, size, text: line, x, y: top + size * ASCENT + index * size * LEADING, w };
    });
  }
  return [];
}

export interface Fact {
  label: string;
  value: string;
}

/** Label over value, in columns as wide as they need, in as many rows as it takes, at the largest size at which all of it fits. */
export function fitFacts(facts: readonly Fact[], box: Box, largest: number, measure: Measure): Placed[] {
  for (let size = largest; size >= SMALLEST; size *= STEP) {
    const small = size * 0.7;
    const gap = size * 0.9;
    const row = small * (ASCENT + DESCENT) + size * (ASCENT + DESCENT) + size * 0.1;
    const widths = facts.map((fact) => Math.max(measure(fact.label, 'plain', small), measure(fact.value, 'strong', size)));
    const rows: number[][] = [];
    let used = 0;
    widths.forEach((width, index) => {
      const last = rows.at(-1);
      if (last && used + gap + width <= box.w) {
        last.push(index);
        used += gap + width;
      } else {
        rows.push([index]);
        used = width;
      }
    });
    const between = size * 0.25;
    if (Math.max(0, ...widths) > box.w || rows.length * row + (rows.length - 1) * between > box.h) continue;
    return rows.flatMap((row_, r) => {
      let x = box.x;
      const y = box.y + r * (row + between);
      return row_.flatMap((index): Placed[] => {
        const fact = facts[index]!;
        const placed: Placed[] = [
          { face: 'plain', size: small, text: fact.label, x, y: y + small * ASCENT, w: measure(fact.label, 'plain', small) },
          { face: 'strong', size, text: fact.value, x, y: y + small * (ASCENT + DESCENT) + size * (0.1 + ASCENT), w: measure(fact.value, 'strong', size) },
        ];
        x += widths[index]! + gap;
        return placed;
      });
    });
  }
  return [];
}

export const boxOf = (placed: Placed): Box => ({ x: placed.x, y: placed.y - placed.size * ASCENT, w: placed.w, h: placed.size * (ASCENT + DESCENT) });
