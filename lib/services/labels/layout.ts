import type { Design } from '@/lib/contracts/labels';
import { highestFrom, type Fall } from './fall';
import { ASCENT, boxOf, DESCENT, fitFacts, fitText, type Box, type Fact, type Measure, type Placed } from './fit';

export const MM = 72 / 25.4;

/** What one label says. */
export interface LabelText {
  name: string;
  /** Under the name: the kind and the sparkle. */
  under: string;
  facts: Fact[];
  /** Allergens and whatever else the law wants in words. */
  small: string;
  /** At the ends of the fall. */
  ends: { original: string | null; final: string | null };
  qr: string | null;
}

export interface LabelPicture {
  texts: Placed[];
  /** Where the code goes, with its white around it inside. */
  qr: Box | null;
  /** The fall's place, or the bands'. */
  art: { kind: 'fall'; box: Box; fall: Fall; flags: Array<{ box: Box; letter: string }> } | { kind: 'bands'; box: Box } | null;
  rules: Array<{ x1: number; x2: number; y: number }>;
}

/** Small letters of this size are 0.9 mm high, points: the least on a small pack by Regulation (EU) 1169/2011, Article 13 (from memory). */
const READABLE_PT = 4.7;
/** Under this a long word of a name is broken instead, points. */
const SMALLEST_NAME_PT = 9;
/** The code is never smaller than this, or phones do not read it: 14 mm with 1 mm clear on either side. */
const QR_MM = 14;
const QR_CLEAR_MM = 1;

interface Frame {
  width: number;
  height: number;
  /** Against the label of 95 × 62 mm that the drawing was made for. */
  scale: number;
  margin: number;
  measure: Measure;
}

/** Lays one label out in a frame of its own, its corner at 0, 0. All text is fitted into a box of its own. */
export function layLabel(text: LabelText, design: Design, size: { width: number; height: number; neck: boolean }, fall: Fall | null, measure: Measure): LabelPicture {
  const width = size.width * MM;
  const height = size.height * MM;
  const scale = Math.min(size.width / 95, size.height / 62);
  const frame: Frame = { width, height, scale, margin: Math.max(2 * MM, 3 * MM * scale), measure };
  if (design === 'log' && fall && !size.neck) return logLabel(text, frame, fall);
  if (design === 'bands') return bandsLabel(text, frame);
  return plainLabel(text, frame);
}

/** The foot of every label: facts, the words of the law, and the code at the right. */
function foot(text: LabelText, frame: Frame, top: number, left: number, qrTop = top): { texts: Placed[]; qr: Box | null } {
  const { width, height, margin, scale, measure } = frame;
  const qrSide = QR_MM * MM;
  const clear = QR_CLEAR_MM * MM;
  const bottom = height - margin;
  const room = bottom - top;
  const qrRoom = bottom - qrTop;
  const qr: Box | null = text.qr && qrRoom >= qrSide && width - left > 2.2 * qrSide ? { x: width - margin - qrSide, y: bottom - qrSide - (qrRoom - qrSide) / 2, w: qrSide, h: qrSide } : null;
  const w = (qr ? qr.x - clear : width - margin) - left;
  const small = smallPrint(text.small, { x: left, w, bottom, room }, frame);
  const smallTop = Math.min(bottom, ...small.map((line) => boxOf(line).y));
  const facts = fitFacts(text.facts, { x: left, y: top, w, h: smallTop - top - (small.length > 0 ? margin * 0.25 : 0) }, 9.5 * Math.max(scale, 0.6), measure);
  return { texts: [...facts, ...small], qr };
}

/** Share of the foot that the words of the law may take: more only where they would else be too small to read. */
const SMALL_SHARES = [0.36, 0.46, 0.56, 0.66];

/** Allergens and what else has to be read: it gets room before the facts do. */
function smallPrint(words: string, { x, w, bottom, room }: { x: number; w: number; bottom: number; room: number }, { scale, measure }: Frame): Placed[] {
  let lines: Placed[] = [];
  for (const share of SMALL_SHARES) {
    const h = room * share;
    lines = fitText(words, { x, y: bottom - h, w, h }, { face: 'plain', largest: Math.max(READABLE_PT, 6.8 * scale), smallest: READABLE_PT, lines: 8, align: 'left', valign: 'bottom' }, measure);
    if ((lines[0]?.size ?? READABLE_PT) >= READABLE_PT) return lines;
  }
  return lines;
}

/** The label is the log: the fall from the left, the name in the space it leaves. */
function logLabel(text: LabelText, frame: Frame, fall: Fall): LabelPicture {
  const { width, height, margin, scale, measure } = frame;
  const bed = height * (frame.scale < 0.75 ? 0.5 : 0.62);
  const top = margin * 1.8;
  const art: Box = { x: 0, y: top, w: width, h: bed - top };
  const endSize = Math.max(5, 8 * scale);
  const ends: Placed[] = [];
  const originalW = text.ends.original ? measure(text.ends.original, 'plain', endSize) : 0;
  if (text.ends.original) ends.push({ face: 'plain', size: endSize, text: text.ends.original, x: margin, y: top - margin * 0.35, w: originalW });
  const finalTop = bed - endSize * (ASCENT + DESCENT) - 1.5;
  if (text.ends.final) {
    const w = measure(text.ends.final, 'plain', endSize);
    ends.push({ face: 'plain', size: endSize, text: text.ends.final, x: width - margin - w, y: finalTop + endSize * ASCENT, w });
  }
  const flagSide = Math.max(5.5, 8.5 * scale);
  const flagged = fall.posts.length > 0;
  const footer = foot(text, frame, bed + (flagged ? flagSide + margin * 0.35 : margin * 0.6), margin, bed + (QR_CLEAR_MM + 0.5) * MM);
  // The code keeps its white: flags stop before it.
  const end = footer.qr ? footer.qr.x - QR_CLEAR_MM * MM : width;
  const flags = spread(fall.posts.map((post) => ({ x: post.t * width, letter: post.letter })), flagSide, end).map(({ x, letter }) => ({ box: { x, y: bed, w: flagSide, h: flagSide }, letter }));
  return {
    texts: [...ends, ...nameBeside(text, frame, fall, art, finalTop, margin + originalW), ...flags.map(({ box, letter }) => flagLetter(letter, box, measure)), ...footer.texts],
    qr: footer.qr,
    art: { kind: 'fall', box: art, fall, flags },
    rules: [{ x1: 0, x2: width, y: bed }],
  };
}

/** Tries how far left the name may begin, and takes the place where it stands largest above the fall. */
function nameBeside(text: LabelText, frame: Frame, fall: Fall, art: Box, floor: number, originalEnd: number): Placed[] {
  const { width, margin, scale, measure } = frame;
  const underSize = Math.max(5, 8.4 * scale);
  let best: Placed[] = [];
  for (let share = 0.12; share <= 0.62; share += 0.05) {
    const x = Math.max(share * width, originalEnd + margin * 0.6);
    const surface = art.y + art.h * (1 - highestFrom(fall, x / width)) - 2;
    const bottom = Math.min(surface, floor - 1);
    const underH = text.under ? underSize * 1.5 : 0;
    const box: Box = { x, y: margin, w: width - margin - x, h: bottom - margin - underH };
    if (box.h < 8 || box.w < 20) continue;
    const name = fitText(text.name, box, { face: 'name', largest: nameSize(text.name) * scale, smallest: SMALLEST_NAME_PT, lines: 3, align: 'right', valign: 'top' }, measure);
    if (name.length === 0 || (best[0] && name[0]!.size <= best[0].size)) continue;
    const last = name.at(-1)!;
    const under = fitText(text.under, { x, y: last.y + last.size * 0.3, w: box.w, h: underH }, { face: 'plain', largest: underSize, smallest: 4.5, lines: 1, align: 'right' }, measure);
    best = [...name, ...under];
  }
  return best;
}

/** Names over eleven letters step down, so that sheets of several look alike. */
function nameSize(name: string): number {
  const longest = Math.max(...name.split(/\s+/).map((word) => [...word].length));
  const letters = [...name].length;
  return letters <= 11 ? 37 : letters <= 18 || longest <= 11 ? 30 : 24;
}

/** Flags that would lie over each other move apart; those pushed off the edge stay at it. */
function spread(flags: Array<{ x: number; letter: string }>, side: number, width: number): Array<{ x: number; letter: string }> {
  const out: Array<{ x: number; letter: string }> = [];
  for (const flag of flags.toSorted((a, b) => a.x - b.x)) {
    const x = Math.max(Math.min(flag.x, width - side), (out.at(-1)?.x ?? -Infinity) + side + 1);
    if (x + side <= width) out.push({ x, letter: flag.letter });
  }
  return out;
}

function flagLetter(letter: string, box: Box, measure: Measure): Placed {
  const size = box.h * 0.72;
  const w = measure(letter, 'strong', size);
  return { face: 'strong', size, text: letter, x: box.x + (box.w - w) / 2, y: box.y + box.h * 0.76, w };
}

/** Words alone: name over a rule, facts under it. */
function plainLabel(text: LabelText, frame: Frame): LabelPicture {
  const { width, height, margin, scale, measure } = frame;
  const split = height * 0.52;
  const underH = text.under ? Math.max(6, 11 * scale) : 0;
  const name = fitText(text.name, { x: margin, y: margin, w: width - 2 * margin, h: split - margin * 1.6 - underH }, { face: 'name', largest: nameSize(text.name) * scale * 1.15, smallest: SMALLEST_NAME_PT, lines: 3, align: 'left', valign: 'middle' }, measure);
  const under = fitText(text.under, { x: margin, y: split - margin * 0.6 - underH, w: width - 2 * margin, h: underH }, { face: 'plain', largest: Math.max(5, 8.4 * scale), smallest: 4.5, lines: 1, align: 'left' }, measure);
  const footer = foot(text, frame, split + margin * 0.6, margin);
  return { texts: [...name, ...under, ...footer.texts], qr: footer.qr, art: null, rules: [{ x1: margin, x2: width - margin, y: split }] };
}

/** Level lines down the left side, closer together towards the bottom: haze settling. */
function bandsLabel(text: LabelText, frame: Frame): LabelPicture {
  const { width, height, margin, scale, measure } = frame;
  const band: Box = { x: 0, y: 0, w: width * 0.16, h: height };
  const left = band.w + margin;
  const split = height * 0.52;
  const underH = text.under ? Math.max(6, 11 * scale) : 0;
  const name = fitText(text.name, { x: left, y: margin, w: width - margin - left, h: split - margin * 1.4 - underH }, { face: 'name', largest: nameSize(text.name) * scale, smallest: SMALLEST_NAME_PT, lines: 3, align: 'left', valign: 'top' }, measure);
  const last = name.at(-1);
  const under = fitText(text.under, { x: left, y: last ? last.y + last.size * 0.3 : margin, w: width - margin - left, h: underH }, { face: 'plain', largest: Math.max(5, 8.4 * scale), smallest: 4.5, lines: 1, align: 'left' }, measure);
  const footer = foot(text, frame, split + margin * 0.3, left);
  return { texts: [...name, ...under, ...footer.texts], qr: footer.qr, art: { kind: 'bands', box: band }, rules: [] };
}
