import PDFDocument from 'pdfkit';
import QRCode from 'qrcode';
import { STOCKS, type Design, type Stock, type StockKey } from '@/lib/contracts/labels';
import type { Fall } from './fall';
import type { Box, Measure, Placed } from './fit';
import { fontFiles, runsOf, type Face } from './fonts';
import { layLabel, MM, type LabelPicture, type LabelText } from './layout';

type Doc = InstanceType<typeof PDFDocument>;

const INK = '#111111';
const PAPER = '#ffffff';
const HAZE_EVERY = 2.4;
const LINE = 1.1;
/** Large, so that rounding is small. */
const MEASURED_AT = 100;

export interface Sheet {
  title: string;
  stock: StockKey;
  design: Design;
  /** First place on the first sheet, from 1. */
  start: number;
  /** The drink's colour, or null for one ink: then the fill becomes level lines. */
  colour: string | null;
  fall: Fall | null;
  labels: readonly LabelText[];
}

/** One document with its fonts, and a measure by those fonts. */
function open(stock: Stock, title: string): { doc: Doc; measure: Measure; has: ReadonlySet<string> } {
  const fonts = fontFiles();
  const doc = new PDFDocument({ size: [stock.page.width * MM, stock.page.height * MM], margin: 0, autoFirstPage: false, font: fonts[0]?.path, info: { Title: title, Creator: 'Fallbright', Producer: 'Fallbright' }, lang: 'en' });
  for (const { font, path } of fonts) doc.registerFont(font, path);
  const has = new Set(fonts.map(({ font }) => font));
  // A width grows with its size alone, and shaping a line is dear: each is measured once.
  const widths = new Map<string, number>();
  const measure: Measure = (text, face, size) => {
    const key = `${face} ${text}`;
    let width = widths.get(key);
    if (width === undefined) {
      width = runsOf(text, face, has).reduce((sum, run) => sum + doc.font(run.font).fontSize(MEASURED_AT * run.scale).widthOfString(run.text), 0) / MEASURED_AT;
      widths.set(key, width);
    }
    return width * size;
  };
  return { doc, measure, has };
}

/** The sheets as PDF: vectors, one ink and one drink colour. */
export async function labelsPdf(sheet: Sheet): Promise<Buffer> {
  const stock = STOCKS[sheet.stock];
  const { doc, measure, has } = open(stock, sheet.title);
  const parts: Buffer[] = [];
  doc.on('data', (part: Buffer) => parts.push(part));
  const ended = new Promise<void>((resolve, reject) => {
    doc.on('end', () => resolve());
    doc.on('error', reject);
  });

  const perSheet = stock.across * stock.down;
  const places = sheet.labels.map((_, index) => index + sheet.start - 1);
  const sheets = Math.ceil((sheet.start - 1 + sheet.labels.length) / perSheet);
  const codes = new Map<string, Code>();
  for (let page = 0; page < sheets; page += 1) {
    doc.addPage();
    const here = places.flatMap((place, index) => (Math.floor(place / perSheet) === page ? [{ spot: place % perSheet, text: sheet.labels[index]! }] : []));
    for (const { spot, text } of here) {
      const x = (stock.origin.x + (spot % stock.across) * stock.pitch.x) * MM;
      const y = (stock.origin.y + Math.floor(spot / stock.across) * stock.pitch.y) * MM;
      doc.save().translate(x, y);
      const picture = layLabel(text, sheet.design, { ...stock.label, neck: stock.neck }, sheet.fall, measure);
      drawLabel(doc, picture, text, stock, sheet.colour, has, codes);
      doc.restore();
      if (stock.cutMarks) cutMarks(doc, { x, y, w: stock.label.width * MM, h: stock.label.height * MM });
    }
    if (stock.cutMarks) footnote(doc, stock, page + 1, sheets, measure, has);
  }
  doc.end();
  await ended;
  return Buffer.concat(parts);
}

function drawLabel(doc: Doc, picture: LabelPicture, text: LabelText, stock: Stock, colour: string | null, has: ReadonlySet<string>, codes: Map<string, Code>): void {
  const [w, h] = [stock.label.width * MM, stock.label.height * MM];
  // Nothing of one label may ever stand on its neighbour.
  doc.save().rect(0, 0, w, h).clip();
  const { art } = picture;
  if (art?.kind === 'fall') drawFall(doc, art.box, art.fall, colour);
  if (art?.kind === 'bands') drawBands(doc, art.box, colour);
  for (const rule of picture.rules) doc.moveTo(rule.x1, rule.y).lineTo(rule.x2, rule.y).lineWidth(LINE).stroke(INK);
  if (art?.kind === 'fall') for (const flag of art.flags) doc.rect(flag.box.x, flag.box.y, flag.box.w, flag.box.h).fill(INK);
  const letters = new Set(art?.kind === 'fall' ? art.flags.map((flag) => flag.letter) : []);
  for (const placed of picture.texts) {
    const onFlag = art?.kind === 'fall' && letters.has(placed.text) && art.flags.some((flag) => placed.x >= flag.box.x && placed.x < flag.box.x + flag.box.w && placed.y > flag.box.y && placed.y < flag.box.y + flag.box.h);
    write(doc, placed, has, onFlag ? PAPER : INK);
  }
  if (picture.qr && text.qr) drawCode(doc, picture.qr, codeOf(text.qr, codes));
  doc.restore();
  // A sheet to cut has its frame; sticky ones have their edge.
  if (stock.cutMarks) doc.rect(0, 0, w, h).lineWidth(LINE).stroke(INK);
}

function write(doc: Doc, placed: Placed, has: ReadonlySet<string>, colour: string): void {
  let x = placed.x;
  for (const run of runsOf(placed.text, placed.face, has)) {
    doc.font(run.font).fontSize(placed.size * run.scale).fillColor(colour).text(run.text, x, placed.y, { lineBreak: false, baseline: 'alphabetic' });
    x += doc.widthOfString(run.text);
  }
}

function surface(doc: Doc, box: Box, fall: Fall): Doc {
  const at = (point: { t: number; level: number }) => [box.x + point.t * box.w, box.y + box.h * (1 - point.level)] as const;
  fall.points.forEach((point, index) => (index === 0 ? doc.moveTo(...at(point)) : doc.lineTo(...at(point))));
  return doc;
}

/** The drink that was left, hazy; its surface is the fall. */
function drawFall(doc: Doc, box: Box, fall: Fall, colour: string | null): void {
  const bottom = box.y + box.h;
  doc.save();
  surface(doc, box, fall).lineTo(box.x + box.w, bottom).lineTo(box.x, bottom).closePath().clip();
  if (colour) doc.rect(box.x, box.y, box.w, box.h).fill(colour);
  for (let y = bottom - HAZE_EVERY; y > box.y; y -= HAZE_EVERY) doc.moveTo(box.x, y).lineTo(box.x + box.w, y).lineWidth(colour ? 0.5 : 0.7).stroke(colour ? PAPER : INK);
  doc.restore();
  surface(doc, box, fall).lineWidth(1.4).lineJoin('round').stroke(INK);
}

function drawBands(doc: Doc, box: Box, colour: string | null): void {
  if (colour) doc.rect(box.x, box.y, box.w, box.h).fill(colour);
  let gap = box.h * 0.16;
  for (let y = box.y + gap; y < box.y + box.h - 1; y += gap) {
    doc.moveTo(box.x, y).lineTo(box.x + box.w, y).lineWidth(colour ? 0.8 : 1).stroke(colour ? PAPER : INK);
    gap = Math.max(2, gap * 0.86);
  }
  doc.moveTo(box.x + box.w, box.y).lineTo(box.x + box.w, box.y + box.h).lineWidth(LINE).stroke(INK);
}

interface Code {
  size: number;
  dark: (row: number, column: number) => boolean;
}

function codeOf(url: string, known: Map<string, Code>): Code {
  const found = known.get(url);
  if (found) return found;
  const { modules } = QRCode.create(url, { errorCorrectionLevel: 'M' });
  const code: Code = { size: modules.size, dark: (row, column) => Boolean(modules.get(row, column)) };
  known.set(url, code);
  return code;
}

/** Drawn as rows of bars: no picture to blur. The white around it is the label's. */
function drawCode(doc: Doc, box: Box, code: Code): void {
  const side = box.w / code.size;
  doc.rect(box.x - MM, box.y - MM, box.w + 2 * MM, box.h + 2 * MM).fill(PAPER);
  for (let row = 0; row < code.size; row += 1) {
    for (let from = 0; from < code.size; from += 1) {
      if (!code.dark(row, from)) continue;
      let to = from;
      while (to + 1 < code.size && code.dark(row, to + 1)) to += 1;
      // A hair over, so that no white seams show between rows.
      doc.rect(box.x + from * side, box.y + row * side, (to - from + 1) * side, side * 1.02);
      from = to;
    }
  }
  doc.fill(INK);
}

function cutMarks(doc: Doc, box: Box): void {
  const [gap, length] = [0.6 * MM, 1.6 * MM];
  for (const x of [box.x, box.x + box.w]) for (const [a, b] of [[box.y - gap - length, box.y - gap], [box.y + box.h + gap, box.y + box.h + gap + length]] as const) doc.moveTo(x, a).lineTo(x, b);
  for (const y of [box.y, box.y + box.h]) for (const [a, b] of [[box.x - gap - length, box.x - gap], [box.x + box.w + gap, box.x + box.w + gap + length]] as const) doc.moveTo(a, y).lineTo(b, y);
  doc.lineWidth(0.4).stroke('#666666');
}

function footnote(doc: Doc, stock: Stock, page: number, pages: number, measure: Measure, has: ReadonlySet<string>): void {
  const text = `Fallbright label sheet ${page} of ${pages}. ${stock.page.name}, ${stock.across} × ${stock.down}, ${stock.label.width} × ${stock.label.height} mm. Print at 100 %, cut on the marks.`;
  const face: Face = 'plain';
  write(doc, { face, size: 6.5, text, x: stock.origin.x * MM, y: (stock.page.height - 6) * MM, w: measure(text, face, 6.5) }, has, INK);
}
