import type uPlot from 'uplot';
import type { Palette } from './palette';
import type { Picture } from './picture';
import type { Layout, Strip } from './strips';

/** What a mark needs to draw: a canvas in CSS pixels, the scales, the theme. */
export interface View {
  context: CanvasRenderingContext2D;
  palette: Palette;
  layout: Layout;
  picture: Picture;
  /** Device pixels to a CSS pixel. */
  ratio: number;
  /** Edges of the plot inside the canvas, px. */
  left: number;
  right: number;
  top: number;
  bottom: number;
  x(at: number): number;
  y(strip: Strip, value: number): number;
  haze: CanvasPattern | string;
}

export type Mark = (view: View) => void;

/** Half a pixel's shift that keeps a one-pixel line sharp. */
export const crisp = (value: number): number => Math.round(value) + 0.5;

export function viewOf(plot: uPlot, parts: { palette: Palette; layout: Layout; picture: Picture; ratio: number; haze: CanvasPattern | string }): View {
  const { ratio } = parts;
  const left = plot.bbox.left / ratio;
  const top = plot.bbox.top / ratio;
  return {
    ...parts,
    context: plot.ctx,
    left,
    right: left + plot.bbox.width / ratio,
    top,
    bottom: top + plot.bbox.height / ratio,
    x: (at) => left + plot.valToPos(at, 'x'),
    y: (strip, value) => top + strip.top + ((strip.max - value) / (strip.max - strip.min)) * strip.height,
  };
}

/** Runs marks in CSS pixels, whatever the screen's density. */
export function drawMarks(view: View, marks: readonly Mark[]): void {
  const { context, ratio } = view;
  for (const mark of marks) {
    context.save();
    context.setTransform(ratio, 0, 0, ratio, 0, 0);
    // What uPlot drew last leaves its own width and dash behind.
    context.lineWidth = 1;
    context.setLineDash([]);
    mark(view);
    context.restore();
  }
}

/** Keeps a mark inside the plot. */
export function clipToPlot({ context, left, right, top, bottom }: View): void {
  context.beginPath();
  context.rect(left, top, right - left, bottom - top);
  context.clip();
}

export function setText({ context, palette }: View, colour: string, weight = 500, size = 1): void {
  context.font = `${weight} ${(palette.textSize * size).toFixed(2)}px ${palette.font}`;
  context.fillStyle = colour;
  context.textBaseline = 'middle';
}

export function line(context: CanvasRenderingContext2D, points: readonly (readonly [number, number])[]): void {
  context.beginPath();
  points.forEach(([x, y], index) => (index === 0 ? context.moveTo(x, y) : context.lineTo(x, y)));
  context.stroke();
}

/** Fills with haze in device pixels, where its lines stay one pixel thin. */
export function fillHaze({ context, ratio, haze }: View, x: number, y: number, width: number, height: number): void {
  context.save();
  context.setTransform(1, 0, 0, 1, 0, 0);
  context.fillStyle = haze;
  context.fillRect(x * ratio, y * ratio, width * ratio, height * ratio);
  context.restore();
}
