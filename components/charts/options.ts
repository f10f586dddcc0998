import uPlot from 'uplot';
import type { Calendar } from './calendar';
import { SERIES } from './columns';
import { airlockWords, bedWords } from './captions';
import { airlockLine, bed, calendarRules, rangeBand, stripNames, stripRules, valueRules } from './ground';
import { hazePattern } from './haze';
import { bracket, expectedWords, likelyEnd, nowLine, posts, rings } from './over';
import { laidCurves } from './laid';
import { drinkShare, thin, type Palette } from './palette';
import { hasStopped, type Picture, type Span } from './picture';
import { stretched, type Layout } from './strips';
import { drawMarks, viewOf, type View } from './view';

/** What a chart reads anew at every drawing, so that live data and a change of theme need no new chart. */
export interface Scene {
  picture: Picture;
  layout: Layout;
  span: Span;
  calendar: Calendar;
  palette: Palette;
  timeZone: string;
}

export interface ChartHandlers {
  /** A stretch was dragged out. */
  onSelect?: (span: Span) => void;
  /** The cursor moved; null when it left. */
  onCursor?: (at: number | null) => void;
}

const HIDDEN = { show: false };

/** A figure of gas stands at the middle of its hours, so its bar stands around it. */
export const GAS_BARS = { size: [0.72, 100, 1], align: 0 } satisfies uPlot.Series.BarsPathBuilderOpts;

/** Options of one chart, for the batch page or for a lane of the shelf. */
export function chartOptions(scene: () => Scene, size: { width: number; height: number }, handlers: ChartHandlers = {}): uPlot.Options {
  const page = scene().layout.style !== 'lane';
  const { left, right } = scene().layout;
  const stopped = page && hasStopped(scene().picture);
  const ink = () => scene().palette.ink;
  const ratio = () => uPlot.pxRatio || 1;
  // uPlot takes widths in CSS pixels but dashes in the screen's.
  const dashed = (...lengths: number[]) => lengths.map((length) => length * ratio());
  const view = (plot: uPlot): View => {
    const now = scene();
    return viewOf(plot, { palette: now.palette, layout: now.layout, picture: now.picture, ratio: ratio(), haze: hazePattern(plot.ctx, now.palette, ratio(), false) });
  };
  const strip = (key: 'gravity' | 'temperature' | 'gas'): uPlot.Scale => ({
    // Asked anew with every change of data or span, though the answer depends on the layout alone.
    auto: true,
    range: () => {
      const { layout } = scene();
      const own = layout[key];
      return own ? stretched(own, layout.height) : [0, 1];
    },
  });
  const band = (plot: uPlot) => hazePattern(plot.ctx, scene().palette, ratio(), true);
  const silent: uPlot.Series = { scale: 'gravity', points: HIDDEN, spanGaps: true };
  const underlay = calendarRules(() => scene().calendar);
  const overlay = [stripNames, laidCurves, bedWords, airlockWords, posts, likelyEnd, expectedWords, rings, bracket, nowLine(scene().timeZone)];

  const series: uPlot.Series[] = [{}];
  series[SERIES.bandHigh] = silent;
  series[SERIES.bandLow] = silent;
  series[SERIES.fit] = {
    ...silent,
    stroke: ink,
    width: page ? 2.2 : 1.9,
    fill: () => thin(scene().palette.drink, drinkShare(scene().palette, page)),
    fillTo: () => scene().picture.bed?.value ?? scene().layout.gravity.min,
  };
  series[SERIES.forecast] = { ...silent, stroke: ink, width: page ? 1.6 : 1.4, dash: dashed(5, 3) };
  series[SERIES.expectedHigh] = silent;
  series[SERIES.expectedLow] = silent;
  series[SERIES.expected] = { ...silent, stroke: () => (stopped ? scene().palette.ink : scene().palette.ink3), width: stopped ? 1.6 : 1.3, dash: stopped ? dashed(5, 3) : dashed(1.5, 3) };
  series[SERIES.readings] = {
    scale: 'gravity',
    paths: () => null,
    stroke: ink,
    points: page ? { show: true, size: 3, width: 0, fill: ink, space: 0 } : HIDDEN,
  };
  series[SERIES.temperature] = { scale: 'temperature', stroke: () => scene().palette.mercury, width: page ? 1.8 : 1.4, points: HIDDEN };
  series[SERIES.gas] = {
    scale: 'gas',
    show: page,
    paths: uPlot.paths.bars?.(GAS_BARS),
    fill: () => thin(scene().palette.ink, 0.72),
    fillTo: () => 0,
    points: HIDDEN,
  };

  return {
    ...size,
    pxAlign: false,
    padding: [0, right, 0, left],
    legend: HIDDEN,
    axes: [HIDDEN, HIDDEN],
    scales: { x: { time: true, range: () => [scene().span.from, scene().span.to] }, gravity: strip('gravity'), temperature: strip('temperature'), gas: strip('gas') },
    series,
    bands: [
      { series: [SERIES.bandHigh, SERIES.bandLow], fill: band },
      ...(page ? [{ series: [SERIES.expectedHigh, SERIES.expectedLow] as [number, number], fill: band }] : []),
    ],
    cursor: page
      ? { x: true, y: false, points: HIDDEN, drag: { x: true, y: false, setScale: false, dist: 8 } }
      : { show: false },
    hooks: {
      drawClear: [(plot) => drawMarks(view(plot), [underlay, rangeBand, valueRules, stripRules, bed, airlockLine])],
      draw: [(plot) => drawMarks(view(plot), overlay)],
      setSelect: [
        (plot) => {
          if (plot.select.width < 8) return;
          handlers.onSelect?.({ from: plot.posToVal(plot.select.left, 'x'), to: plot.posToVal(plot.select.left + plot.select.width, 'x') });
          plot.setSelect({ left: 0, top: 0, width: 0, height: 0 }, false);
        },
      ],
      setCursor: [
        (plot) => {
          const { left: x } = plot.cursor;
          handlers.onCursor?.(typeof x === 'number' && x >= 0 ? plot.posToVal(x, 'x') : null);
        },
      ],
    },
  };
}
