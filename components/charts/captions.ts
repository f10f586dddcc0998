import { gravityDoubt, gravityNumber } from '@/components/ui/units';
import { underText } from './ground';
import { postPlaces } from './over';
import { rightmostRoom, type Stretch } from './place';
import { setText, type Mark, type View } from './view';

/** Words at the lines of a page's strips. They look for room; where there is none the shorter ones are taken, then none. */

/** Hides what runs through it: dots and bars are no paper. */
const COVER = 0.92;

function caption(view: View, choices: readonly string[], y: number, taken: readonly Stretch[], from = view.left + 6): void {
  const { context, right } = view;
  context.textAlign = 'right';
  for (const words of choices) {
    const end = rightmostRoom(context.measureText(words).width, { from, to: right - 6 }, taken);
    if (end !== null) return underText(view, words, end, y, COVER);
  }
}

/** Where the fall should stop, under its line and beside the events that stand there. */
export const bedWords: Mark = (view) => {
  const { palette, layout, picture } = view;
  if (!picture.bed || layout.style === 'lane') return;
  const phone = layout.style === 'phone';
  const figures = `${gravityNumber(picture.bed.value)} ${gravityDoubt(picture.bed.value, Math.max(0.001, (picture.bed.hi - picture.bed.lo) / 2))}`;
  const { shown, placed, bedY } = postPlaces(view);
  const nowX = view.x(picture.now);
  const taken = placed.map((place): Stretch => ({ from: place.left - 6, to: place.left + place.width + (place.word && !phone ? shown[place.index]!.wordWidth + 8 : 6) }));
  setText(view, palette.ink, phone ? 600 : 500);
  caption(view, [...(phone ? [] : [`bed: where it should stop, ${figures}`]), `bed ${figures}`], bedY + (phone ? 12 : 10), [...taken, { from: nowX - 6, to: nowX + 6 }]);
};

/** At the line of the gas that an airlock holds, beside the gas of now. */
export const airlockWords: Mark = (view) => {
  const { context, palette, layout, picture } = view;
  if (!layout.gas || picture.airlockHolds === null || layout.style === 'lane') return;
  const y = view.y(layout.gas, picture.airlockHolds);
  const nowX = view.x(picture.now);
  setText(view, palette.ink2);
  const figure = context.measureText('0.00').width;
  // Under the line where the strip's own edge is near above it and there is room below.
  const below = y - view.y(layout.gas, layout.gas.max) < 14 && view.y(layout.gas, 0) - y > 16;
  const limit = picture.airlockHolds.toFixed(2);
  // Left of it stands the strip's name.
  const from = view.left + context.measureText('gas, L/h').width + 24;
  caption(view, [`airlock holds under ${limit}`, `airlock under ${limit}`], below ? y + 9 : y - 9, [{ from: nowX - figure - 14, to: nowX + figure + 14 }], from);
};
