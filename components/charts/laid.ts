import type { Laid } from './picture';
import { clipToPlot, line, setText, type Mark, type View } from './view';

/** Curves laid over the evidence that are no part of it: what if, another curve, another batch. Dotted, and named in a dashed frame where they end. */

function frame(view: View, words: string, x: number, y: number): void {
  const { context, palette } = view;
  setText(view, palette.ink, 600, 0.96);
  context.textAlign = 'left';
  const width = context.measureText(words).width + 12;
  const left = Math.max(view.left + 2, Math.min(x, view.right - width - 2));
  const top = Math.max(view.top + 22, Math.min(y, view.bottom - 20));
  context.fillStyle = palette.lit;
  context.fillRect(left, top, width, 18);
  context.strokeStyle = palette.ink;
  context.lineWidth = 1;
  context.setLineDash([3, 2]);
  context.strokeRect(left + 0.5, top + 0.5, width - 1, 17);
  context.setLineDash([]);
  context.fillStyle = palette.ink;
  context.fillText(words, left + 6, top + 9.5);
}

/** The point half way down. */
function middleOf(points: Laid['points']): Laid['points'][number] {
  const half = (points[0]!.gravity + points[points.length - 1]!.gravity) / 2;
  return points.find((point) => point.gravity <= half) ?? points[0]!;
}

export const laidCurves: Mark = (view) => {
  const { context, palette, layout, picture } = view;
  for (const laid of picture.laid ?? []) {
    const points = laid.points.map((point) => [view.x(point.at), view.y(layout.gravity, point.gravity)] as const);
    if (points.length < 2) continue;
    context.save();
    clipToPlot(view);
    context.strokeStyle = palette.sheet;
    context.lineWidth = 4;
    line(context, points);
    context.strokeStyle = palette.ink;
    context.lineWidth = 2.2;
    context.lineCap = 'round';
    context.setLineDash([0.1, 4.6]);
    line(context, points);
    context.setLineDash([]);
    context.lineCap = 'butt';
    if (laid.end) {
      const y = view.y(layout.gravity, laid.end.gravity);
      context.fillStyle = palette.lit;
      context.strokeStyle = palette.ink;
      context.lineWidth = 1.3;
      const [from, to] = [view.x(laid.end.lo), view.x(laid.end.hi)];
      context.fillRect(from, y - 3, Math.max(6, to - from), 6);
      context.strokeRect(from, y - 3, Math.max(6, to - from), 6);
    }
    context.restore();
    // Named beside its own line: a forecast some way ahead, another curve in the middle of the fall.
    const { at, gravity } = laid.end ? laid.points[Math.floor(laid.points.length * 0.3)]! : middleOf(laid.points);
    frame(view, laid.words, view.x(at) + 16, view.y(layout.gravity, gravity) - 30);
  }
};
