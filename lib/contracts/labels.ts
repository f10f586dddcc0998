import { z } from 'zod';
import { id, line } from './common';
import { howSchema } from './figures';

/** Common label stock, and a tag for the neck. Sizes in `STOCKS`. */
export const STOCK_KEYS = ['a4_cut', 'a4_8', 'a4_21', 'letter_6', 'letter_10', 'neck_a4'] as const;
export type StockKey = (typeof STOCK_KEYS)[number];
/** `log`: the fall of the batch. `plain`: words alone. `bands`: the drink's colour in level lines. */
export const DESIGNS = ['log', 'plain', 'bands'] as const;
export type Design = (typeof DESIGNS)[number];

export interface Stock {
  name: string;
  /** Page, mm. */
  page: { name: 'A4' | 'Letter'; width: number; height: number };
  label: { width: number; height: number };
  across: number;
  down: number;
  /** First label's corner, and from one label to the next, mm. */
  origin: { x: number; y: number };
  pitch: { x: number; y: number };
  cutMarks: boolean;
  /** A tag hangs on the neck: less on it. */
  neck: boolean;
}

const A4 = { name: 'A4', width: 210, height: 297 } as const;
const LETTER = { name: 'Letter', width: 215.9, height: 279.4 } as const;

/** Sheets as shops sell them, by their layout: common practice, measure yours. */
export const STOCKS: Record<StockKey, Stock> = {
  a4_cut: { name: 'A4 paper, 8 labels 95 × 62 mm to cut', page: A4, label: { width: 95, height: 62 }, across: 2, down: 4, origin: { x: 8, y: 14.5 }, pitch: { x: 99, y: 68 }, cutMarks: true, neck: false },
  a4_8: { name: 'A4 sticky, 8 labels 99.1 × 67.7 mm', page: A4, label: { width: 99.1, height: 67.7 }, across: 2, down: 4, origin: { x: 4.65, y: 13.1 }, pitch: { x: 101.6, y: 67.7 }, cutMarks: false, neck: false },
  a4_21: { name: 'A4 sticky, 21 labels 63.5 × 38.1 mm', page: A4, label: { width: 63.5, height: 38.1 }, across: 3, down: 7, origin: { x: 7.25, y: 15.15 }, pitch: { x: 66, y: 38.1 }, cutMarks: false, neck: false },
  letter_6: { name: 'Letter sticky, 6 labels 4 × 3⅓ in', page: LETTER, label: { width: 101.6, height: 84.67 }, across: 2, down: 3, origin: { x: 3.97, y: 12.7 }, pitch: { x: 106.36, y: 84.67 }, cutMarks: false, neck: false },
  letter_10: { name: 'Letter sticky, 10 labels 4 × 2 in', page: LETTER, label: { width: 101.6, height: 50.8 }, across: 2, down: 5, origin: { x: 3.97, y: 12.7 }, pitch: { x: 106.36, y: 50.8 }, cutMarks: false, neck: false },
  neck_a4: { name: 'A4 paper, 18 neck tags 60 × 40 mm to cut', page: A4, label: { width: 60, height: 40 }, across: 3, down: 6, origin: { x: 11, y: 18 }, pitch: { x: 64, y: 44 }, cutMarks: true, neck: true },
};

const yesNo = z.enum(['yes', 'no']).transform((value) => value === 'yes');

/** `GET /api/v1/lots/{id}/labels.pdf`. */
export const labelQuery = z.object({
  stock: z.enum(STOCK_KEYS).default('a4_cut'),
  design: z.enum(DESIGNS).default('log'),
  /** Other words than the lot's. */
  name: line(80).optional(),
  /** One line under the name; without it the kind. */
  under: line(60, 0).optional(),
  /** Labels wanted; without it one for each bottle left. */
  count: z.coerce.number().int().min(1, 'must be at least 1').max(500, 'must be at most 500').optional(),
  /** First place on the sheet that is not used yet. */
  start: z.coerce.number().int().min(1).max(40).default(1),
  numbered: yesNo.default(true),
  colour: yesNo.default(true),
  /** A share link whose address becomes the QR code; without it the batch's open one. */
  share: id.optional(),
  qr: yesNo.default(true),
});
export type LabelQuery = z.infer<typeof labelQuery>;

/** `GET /api/v1/lots/{id}/label`: what the log has to say on a label, each line with its how. */
export const labelFacts = z.object({
  name: z.string(),
  suggestion: z.object({ name: z.string(), style: z.string().nullable(), rule: z.string(), law: z.string(), source: z.string(), status: z.string() }),
  strength: z.object({ text: z.string().nullable(), note: z.string(), how: howSchema }),
  allergens: z.object({ text: z.string().nullable(), notes: z.array(z.string()), how: howSchema }),
  volumes: z.array(z.object({ size_ml: z.number(), count: z.number().int() })),
  pitched_at: z.string().nullable(),
  bottled_at: z.string(),
  ready_from: z.string(),
  sparkle: z.string(),
  code: z.string(),
  original_gravity: z.number().nullable(),
  final_gravity: z.number().nullable(),
  /** The open share link that the QR code would lead to. */
  share: z.object({ id, url: z.string() }).nullable(),
});
export type LabelFacts = z.infer<typeof labelFacts>;
