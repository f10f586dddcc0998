import { gravityNumber, temperatureName, temperatureNumber } from '@/components/ui/units';
import type { Calendar } from './calendar';
import { thin } from './palette';
import { clipToPlot, crisp, fillHaze, line, setText, type Mark, type View } from './view';

/** Marks under the curves: the calendar's rules, the scales, the bed, the wanted temperatures. */

export const calendarRules = (calendar: () => Calendar): Mark => (view) => {
  const { context, palette, top, bottom, picture } = view;
  clipToPlot(view);
  context.fillStyle = palette.well;
  for (const weekend of calendar().weekends) context.fillRect(view.x(weekend.from), top, view.x(weekend.to) - view.x(weekend.from), bottom - top);
  context.strokeStyle = palette.rule;
  context.lineWidth = 1;
  for (const at of calendar().rules) {
    const x = crisp(view.x(at));
    // Past days are ruled, coming ones dotted.
    context.setLineDash(at > picture.now ? [1, 4] : []);
    line(context, [[x, top], [x, bottom]]);
  }
};

/** Level rules at the round values, with their figures in the left gutter. */
export const valueRules: Mark = (view) => {
  const { context, palette, layout, left, right, picture } = view;
  if (layout.style === 'lane') return;
  context.textAlign = 'right';
  context.strokeStyle = palette.rule;
  const figure = (text: string, y: number, colour: string, weight = 500) => {
    setText(view, colour, weight);
    context.fillText(text, left - 8, y + 0.5);
  };
  for (const value of layout.ticks.gravity) {
    const y = crisp(view.y(layout.gravity, value));
    line(context, [[left, y], [right, y]]);
    figure(gravityNumber(value), y, palette.ink2);
  }
  if (picture.bed) figure(gravityNumber(picture.bed.value), view.y(layout.gravity, picture.bed.value), palette.ink, 700);
  if (layout.temperature) for (const value of layout.ticks.temperature) figure(temperatureNumber(value).replace(/\.0$/, ''), view.y(layout.temperature, value), palette.ink2);
  if (layout.gas) {
    const decimals = layout.gas.max < 0.2 ? 2 : 1;
    for (const value of layout.ticks.gas) {
      const y = crisp(view.y(layout.gas, value));
      line(context, [[left, y], [right, y]]);
      figure(value.toFixed(decimals), y, palette.ink2);
    }
  }
};

/** Rules between the strips, a little wider than the plot, and the axis under the last one. */
export const stripRules: Mark = ({ context, palette, layout, left, right, top }) => {
  layout.rules.forEach((offset, index) => {
    const last = index === layout.rules.length - 1;
    context.strokeStyle = last ? palette.ink : palette.rule2;
    context.lineWidth = last ? 1.5 : 1;
    const y = last ? top + offset - 0.75 : crisp(top + offset);
    line(context, [[layout.style === 'phone' ? 0 : left - 56, y], [right + layout.right, y]]);
  });
};

export const rangeBand: Mark = (view) => {
  const { context, palette, layout, picture, left, right } = view;
  if (!layout.temperature || !picture.range) return;
  const lane = layout.style === 'lane';
  const seen = picture.readings.at;
  // In a lane the band is as long as the record; on a page it runs on as the aim.
  const from = lane ? Math.max(left, view.x(seen[0] ?? picture.now)) : left;
  const to = lane ? Math.min(right, view.x(picture.now)) : right;
  const high = view.y(layout.temperature, picture.range.max);
  const low = view.y(layout.temperature, picture.range.min);
  context.fillStyle = palette.range;
  if (to > from) context.fillRect(from, high, to - from, Math.max(2, low - high));
};

/** The line where the fall should stop, with its own doubt above it. */
export const bed: Mark = (view) => {
  const { context, palette, layout, picture, left, right } = view;
  const page = layout.style !== 'lane';
  const value = picture.bed?.value ?? (page ? null : layout.gravity.min);
  if (value === null) return;
  const y = crisp(view.y(layout.gravity, value));
  if (page && picture.bed && picture.bed.hi > value) {
    const high = Math.max(view.top + layout.gravity.top, view.y(layout.gravity, picture.bed.hi));
    context.globalAlpha = 0.8;
    fillHaze(view, left, high, right - left, y - high);
    context.globalAlpha = 1;
  }
  context.strokeStyle = page ? palette.ink : palette.rule2;
  context.lineWidth = page ? 1.6 : 1;
  line(context, [[left, y], [right, y]]);
};

/** The gas that the airlock holds; its words are a caption. */
export const airlockLine: Mark = (view) => {
  const { context, palette, layout, picture, left, right } = view;
  if (!layout.gas || picture.airlockHolds === null) return;
  const y = crisp(view.y(layout.gas, picture.airlockHolds));
  context.strokeStyle = palette.ink2;
  context.setLineDash([3, 3]);
  line(context, [[left, y], [right, y]]);
  context.setLineDash([]);
};

/** Text on a patch of paper, so that rules do not run through it. */
export function underText(view: View, words: string, x: number, y: number, cover = 0.75): void {
  const { context, palette } = view;
  const width = context.measureText(words).width;
  const from = context.textAlign === 'right' ? x - width : x;
  const colour = context.fillStyle;
  context.fillStyle = thin(palette.sheet, cover);
  context.fillRect(from - 2, y - 7, width + 4, 14);
  context.fillStyle = colour;
  context.fillText(words, x, y);
}

/** What each strip shows, at its line. */
export const stripNames: Mark = (view) => {
  const { context, palette, layout, left, top } = view;
  context.textAlign = 'left';
  const x = left + (layout.style === 'phone' ? 10 : 8);
  if (layout.temperature) {
    setText(view, palette.mercury);
    context.fillText(`temperature, ${temperatureName()}`, x, top + layout.rules[0]! + 11);
  }
  if (layout.gas) {
    setText(view, palette.ink);
    context.fillText('gas, L/h', x, top + layout.rules[layout.rules.length - 2]! + 11);
  }
};
