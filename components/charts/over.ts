import { gravityNumber, temperatureSpan, temperatureText } from '@/components/ui/units';
import { placePosts, keepClear, type Label } from './place';
import { gravityNow, hasStopped, knownUntil, valueAt, type Bracket, type Picture } from './picture';
import { clock, dayName, when } from './zone';
import { underText } from './ground';
import { clipToPlot, crisp, line, setText, type Mark, type View } from './view';

/** Marks over the curves: posts, rings, brackets, the likely end and the now-line. */

const isPage = (view: View) => view.layout.style !== 'lane';
const inside = (view: View, x: number, slack = 0) => x >= view.left - slack && x <= view.right + slack;

function ring({ context, palette }: View, x: number, y: number, radius: number, crossed: boolean): void {
  context.strokeStyle = palette.ink;
  context.fillStyle = palette.lit;
  context.lineWidth = crossed ? 1.7 : 1.4;
  context.beginPath();
  context.arc(x, y, radius, 0, Math.PI * 2);
  context.fill();
  context.stroke();
  if (crossed) {
    context.lineWidth = 1.3;
    line(context, [[x - radius - 4, y], [x + radius + 4, y]]);
  }
}

/** Over a ring where there is room; else under and right of it, or left of it where the lane is low. */
function ringLabel(view: View, ring: { x: number; y: number }, width: number): { x: number; y: number } {
  const page = isPage(view);
  const above = ring.y - view.top > 22;
  // Beside a post's stem rather than on it.
  if (above && !page && view.picture.posts.some((post) => Math.abs(view.x(post.at) - ring.x) < width / 2)) return { x: Math.min(ring.x + 6, view.right - width), y: ring.y - 20 };
  if (above) return { x: Math.max(view.left, Math.min(page ? ring.x + 6 : ring.x - width / 2, view.right - width)), y: ring.y - 20 };
  const low = !page && view.layout.gravity.height < 50 && ring.x - width - 8 > view.left;
  if (low) return { x: ring.x - width - 8, y: ring.y - 6 };
  return { x: Math.min(ring.x + (page ? 10 : 7), view.right - width), y: ring.y + 5 };
}

const bracketRise = (view: View, { kind }: Pick<Bracket, 'kind'>): number => (isPage(view) ? 30 : kind === 'equal' ? 24 : 10);

/** A reading this near the pitch is the original gravity, which stands elsewhere. */
const AT_PITCH_S = 12 * 3600;

/** Hydrometer readings, with their figures where there is room. */
export const rings: Mark = (view) => {
  const { context, palette, layout, picture } = view;
  const page = isPage(view);
  const shown = picture.rings.map((item) => ({ ...item, x: view.x(item.at), y: view.y(layout.gravity, item.gravity) })).filter((item) => inside(view, item.x, 4));
  for (const item of shown) ring(view, item.x, item.y, page ? 5 : 3.6, page);
  if (layout.style === 'lane' && layout.height < 60) return;
  setText(view, palette.ink, page ? 600 : 500, page ? 1 : 0.96);
  context.textAlign = 'left';
  const width = context.measureText('1.000').width;
  const pitch = picture.posts.find((post) => post.letters === 'P')?.at;
  const named = layout.short && pitch !== undefined ? shown.filter((item) => Math.abs(item.at - pitch) > AT_PITCH_S) : shown;
  const nowX = view.x(picture.now);
  const labels = named.map((item): Label => {
    const label = { ...ringLabel(view, item, width), width, height: 13 };
    // Left of the line of now rather than on it.
    return label.x < nowX && label.x + width > nowX - 3 ? { ...label, x: nowX - width - 5 } : label;
  });
  const taken: Label[] = [{ x: nowX - 6, y: view.top, width: page ? 90 : 8, height: 18 }];
  if (picture.bracket) {
    const x = Math.max(view.left, view.x(picture.bracket.from));
    const y = view.y(layout.gravity, picture.bracket.gravity) - bracketRise(view, picture.bracket);
    taken.push({ x: x - 2, y: y - 16, width: Math.max(90, view.x(picture.bracket.to) - x), height: picture.bracket.kind === 'flat' ? 22 : 14 });
  }
  for (const index of keepClear(labels, taken)) {
    const label = labels[index]!;
    context.fillText(gravityNumber(named[index]!.gravity), label.x, label.y + 7);
  }
};

/** Where the boxes of the events stand, and which of them have room for their word. */
export function postPlaces(view: View) {
  const { context, palette, layout, picture } = view;
  const size = layout.style === 'lane' ? 15 : 17;
  setText(view, palette.ink, 600, 0.96);
  context.textAlign = 'left';
  const shown = picture.posts
    .map((post) => ({ ...post, x: view.x(post.at), box: Math.max(size, context.measureText(post.letters).width + 8), wordWidth: context.measureText(post.word).width + 6 }))
    .filter((post) => inside(view, post.x, 2));
  const placed = placePosts(shown.map((post) => ({ x: post.x, box: post.box, word: post.wordWidth })), view.right);
  return { size, shown, placed, bedY: view.y(layout.gravity, picture.bed?.value ?? layout.gravity.min) };
}

/** On a page the letters stand under the bed, with their words; in a lane on the bed, or hanging where it lies flat. */
export const posts: Mark = (view) => {
  const { context, palette, layout, top, bottom } = view;
  const page = isPage(view);
  const { size, shown, placed, bedY } = postPlaces(view);
  for (const place of placed) {
    const post = shown[place.index]!;
    const curveY = surface(view, post.at);
    const hangs = !page && bedY - curveY < 18;
    const y = page ? bedY + 13 : hangs ? top + 1 : bedY - size;
    const x = crisp(post.x);
    context.strokeStyle = post.toCome ? palette.ink : palette.ink2;
    context.lineWidth = 1;
    context.setLineDash(post.toCome ? [2, 2] : []);
    if (page) line(context, [[x, Math.min(curveY, y)], [x, bottom]]);
    else line(context, hangs ? [[x, y], [x, Math.max(curveY, y)]] : [[x, curveY], [x, bedY]]);
    if (post.toCome) {
      context.fillStyle = palette.lit;
      context.fillRect(place.left, y, post.box, size);
      context.strokeRect(place.left + 0.5, y + 0.5, post.box - 1, size - 1);
    } else {
      context.fillStyle = palette.ink;
      context.fillRect(place.left, y, post.box, size);
    }
    context.setLineDash([]);
    setText(view, post.toCome ? palette.ink : palette.on, 600, 0.96);
    context.textAlign = 'center';
    context.fillText(post.letters, place.left + post.box / 2, y + size / 2 + 0.5);
    if (page && place.word && layout.style === 'page') {
      setText(view, palette.ink, 500);
      context.textAlign = 'left';
      context.fillText(post.word, place.left + post.box + 6, y + size / 2 + 0.5);
    }
  }
};

/** Height of the drink's surface at a time: where a post is cut off. */
function surface(view: View, at: number): number {
  const { picture, layout } = view;
  const value = valueAt(picture.curve, at)?.gravity ?? picture.rings.findLast((item) => item.at <= at)?.gravity ?? picture.originalGravity ?? layout.gravity.max;
  return view.y(layout.gravity, value);
}

/** `flat 31 h` in ochre, `equal` in green, over the stretch it speaks of. */
export const bracket: Mark = (view) => {
  const { context, palette, layout, picture } = view;
  if (!picture.bracket) return;
  const { from, to, gravity, words, kind } = picture.bracket;
  const page = isPage(view);
  const left = Math.max(view.left, view.x(from));
  const right = Math.min(view.right, view.x(to));
  if (right - left < 4) return;
  const y = view.y(layout.gravity, gravity) - bracketRise(view, { kind });
  const colour = kind === 'flat' ? palette.ochre : palette.green;
  context.strokeStyle = colour;
  context.lineWidth = page ? 1.8 : 1.5;
  line(context, [[left, y + 7], [left, y], [right, y], [right, y + 7]]);
  setText(view, colour, 600);
  const width = context.measureText(words).width;
  // The words stand over their bracket; a short one near now lets them run to the left.
  context.textAlign = right - left >= width ? (kind === 'equal' ? 'center' : 'left') : 'right';
  const x = context.textAlign === 'left' ? left : context.textAlign === 'center' ? (left + right) / 2 : right - 1;
  context.fillText(words, x, y - 9);
};

/** A bar on the bed over the likely days of the end. */
export const likelyEnd: Mark = (view) => {
  const { context, palette, layout, picture, right } = view;
  if (!picture.likelyEnd || hasStopped(picture)) return;
  const page = isPage(view);
  const bedY = view.y(layout.gravity, picture.bed?.value ?? layout.gravity.min);
  const from = view.x(picture.likelyEnd.lo);
  const to = view.x(picture.likelyEnd.hi);
  context.save();
  clipToPlot(view);
  context.fillStyle = palette.ink;
  context.fillRect(from, bedY - 2.5, Math.max(5, to - from), 5);
  context.restore();
  // Where something else is played with, its own end is what is looked at.
  if (picture.laid?.some((laid) => laid.end)) return;
  const words = page ? `bed on ${picture.likelyEnd.words}` : `${gravityNumber(picture.bed?.value ?? 0)} · ${picture.likelyEnd.words}`;
  context.textAlign = 'right';
  if (page) {
    setText(view, palette.ink, 600);
    const width = context.measureText(words).width;
    const at = Math.min(Math.max(to, view.x(picture.now) + width + 24), right - 6);
    // Over the highest part of the band that the words stand on.
    const stood = picture.curve.filter((point) => view.x(point.at) >= at - width - 6 && view.x(point.at) <= at + 6);
    const reach = Math.max(...stood.map((point) => point.hi), picture.bed?.hi ?? layout.gravity.min);
    if (at - width > view.x(picture.now) + 8) context.fillText(words, at, Math.max(view.top + 30, view.y(layout.gravity, reach) - 12));
    return;
  }
  if (layout.height < 46) return;
  if (layout.short) {
    setText(view, palette.ink, 600, 0.96);
    underText(view, picture.likelyEnd.words, right - 6, view.top + 9);
    return;
  }
  const beyond = from > right - 4;
  setText(view, beyond ? palette.ink2 : palette.ink, 500, 0.96);
  context.fillText(beyond ? `to ${words} ›` : words, Math.min(Math.max(to, view.x(picture.now) + 190), right - 4), view.bottom - (layout.height < 70 ? 8 : 13));
};

/** `what it should have done, 8 in 10`, with a hairline to the band. */
export const expectedWords: Mark = (view) => {
  const { context, palette, layout, picture } = view;
  if (picture.expected.length < 2) return;
  const now = view.x(picture.now);
  const room = view.right - now;
  if (!isPage(view) || !hasStopped(picture)) {
    const point = valueAt(picture.expected, picture.now + (picture.expected.at(-1)!.at - picture.now) * 0.25);
    if (!point || room < 110) return;
    setText(view, palette.ink3, 500, 0.96);
    context.textAlign = 'left';
    context.fillText('expected', now + 62, view.y(layout.gravity, point.gravity) - 16);
    return;
  }
  const words = layout.style === 'phone' ? 'should have, 8 in 10' : 'what it should have done, 8 in 10';
  setText(view, palette.ink2);
  const width = context.measureText(words).width;
  const point = valueAt(picture.expected, picture.now + (picture.expected.at(-1)!.at - picture.now) * 0.2);
  if (!point || room < width + 60) return;
  const foot = { x: view.x(point.at), y: view.y(layout.gravity, (point.hi + point.gravity) / 2) };
  const y = Math.max(view.top + 40, view.y(layout.gravity, point.hi) - 22);
  const x = Math.min(foot.x + 54, view.right - width - 6);
  context.strokeStyle = palette.ink2;
  context.lineWidth = 1;
  line(context, [[foot.x, foot.y], [x - 6, y]]);
  context.textAlign = 'left';
  underText(view, words, x, y);
};

/** The one line through all strips, and the bright dot where the truth is known. */
export const nowLine = (timeZone: string): Mark => (view) => {
  const { context, palette, picture, top, bottom } = view;
  const x = view.x(picture.now);
  const page = isPage(view);
  if (inside(view, x)) {
    context.strokeStyle = palette.ink;
    context.lineWidth = 1.5;
    line(context, [[x, top], [x, bottom]]);
    if (page) {
      const words = picture.ended ? `ended ${dayName(picture.now, timeZone)}` : `now ${clock(picture.now, timeZone)}`;
      setText(view, palette.ink, 600);
      const width = context.measureText(words).width + 14;
      const left = Math.min(x - 0.75, view.right - width);
      context.fillStyle = palette.ink;
      context.fillRect(left, top, width, 18);
      setText(view, palette.on, 600);
      context.textAlign = 'left';
      context.fillText(words, left + 7, top + 9.5);
    }
  }
  dot(view);
  figuresNow(view, x, timeZone);
};

function dot(view: View): void {
  const { context, palette, layout, picture } = view;
  const gravity = gravityNow(picture);
  const x = view.x(knownUntil(picture));
  if (gravity === null || !inside(view, x, 4)) return;
  const y = view.y(layout.gravity, gravity);
  context.beginPath();
  context.arc(x, y, picture.silentAt === null ? 5 : 4.4, 0, Math.PI * 2);
  if (picture.silentAt === null) {
    context.fillStyle = palette.lit;
    context.fill();
    context.beginPath();
    context.arc(x, y, 4, 0, Math.PI * 2);
    context.fillStyle = palette.ink;
    context.fill();
    return;
  }
  context.fillStyle = palette.lit;
  context.fill();
  context.strokeStyle = palette.ink;
  context.lineWidth = 1.5;
  context.setLineDash([2.6, 2]);
  context.stroke();
}

/** `15.4 °C low`, and on a page `2.6 below range`. */
export function temperatureWords(picture: Pick<Picture, 'readings' | 'range'>, long: boolean): string | null {
  const value = picture.readings.temperature.findLast((item) => item !== null);
  if (value === null || value === undefined) return null;
  const figure = temperatureText(value);
  const under = picture.range ? picture.range.min - value : 0;
  const over = picture.range ? value - picture.range.max : 0;
  if (under >= 0.05) return long ? `${figure}, ${temperatureSpan(under).toFixed(1)} below range` : `${figure} low`;
  if (over >= 0.05) return long ? `${figure}, ${temperatureSpan(over).toFixed(1)} above range` : `${figure} high`;
  return figure;
}

function figuresNow(view: View, x: number, timeZone: string): void {
  const { context, palette, layout, picture } = view;
  const figure = temperatureWords(picture, layout.style === 'page');
  // A figure that is not of now gets its time.
  const words = figure && picture.silentAt !== null && layout.style !== 'lane' ? `${figure} at ${when(picture.silentAt, picture.now, timeZone)}` : figure;
  context.textAlign = 'left';
  const put = (text: string, y: number) => {
    const width = context.measureText(text).width;
    // Right of the line, or left of it where the plot ends.
    const at = x + 8 + width <= view.right ? x + 8 : x - 8 - width;
    if (at < view.left) return;
    if (at < x) underText(view, text, at, y);
    else context.fillText(text, at, y);
  };
  if (layout.temperature && words) {
    const lane = layout.style === 'lane';
    setText(view, palette.mercury, lane ? 500 : 600, lane ? 0.96 : 1);
    const value = picture.readings.temperature.findLast((item) => item !== null) ?? layout.temperature.min;
    put(words, lane ? view.bottom - (layout.height < 70 ? 8 : 13) : Math.min(view.y(layout.temperature, value), view.top + layout.temperature.top + layout.temperature.height - 4));
  }
  if (layout.gas && picture.gasNow !== null && picture.silentAt === null) {
    setText(view, palette.ink, 600);
    put(picture.gasNow.toFixed(2), Math.max(view.y(layout.gas, layout.gas.max) + 5, Math.min(view.y(layout.gas, picture.gasNow), view.y(layout.gas, 0) - 7)));
  }
}
