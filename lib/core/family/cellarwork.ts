/** Racking, topping up, splitting and blending: drink moves between vessels, nothing appears or vanishes. */
import { how, type How } from '../how/how';
import { SOURCES } from '../how/sources';
import { roundDown } from '../units/rounding';
import { blend, NOTHING, portion, readContents, type Contents, type Readout } from './contents';

export class CellarWorkError extends RangeError {}

/** A vessel before and after, with what was left behind. */
export interface Moved {
  contents: Contents;
  reading: Readout | null;
  how: How;
}

export interface Racking extends Moved {
  /** What stayed on the lees and in the siphon. */
  left: Contents;
  /** Change of gravity, points, and of strength, % vol, by the top-up. */
  gravityChangePoints: number;
  abvChangePercent: number;
  cautions: readonly string[];
}

const RACKING = (inputs: Parameters<typeof how>[2]) =>
  how('masses of liquid, extract and alcohol are conserved; what is left behind takes its share of each', SOURCES.massBalance, inputs);

/** Contents that fill a given volume, and the rest. */
export function takeVolume(from: Contents, litres: number): { taken: Contents; rest: Contents } {
  const available = readContents(from)?.volumeL ?? 0;
  if (!(litres >= 0) || litres > available * (1 + 1e-9)) {
    throw new CellarWorkError(`cannot take ${litres} L from ${available.toFixed(2)} L`);
  }
  const taken = portion(from, available > 0 ? Math.min(1, litres / available) : 0);
  return { taken, rest: minus(from, taken) };
}

const minus = (all: Contents, part: Contents): Contents => ({
  massG: all.massG - part.massG,
  ethanolG: all.ethanolG - part.ethanolG,
  extractG: all.extractG - part.extractG,
});

/**
 * Racks a batch off its lees.
 *
 * @param from what stood in the vessel
 * @param leftL volume left with the lees and lost on the way, L
 * @param topUp what the new vessel is topped up with, if anything
 */
export function rack(from: Contents, leftL: number, topUp: readonly Contents[] = []): Racking {
  const before = readContents(from);
  const { taken: left, rest } = takeVolume(from, leftL);
  const contents = blend([rest, ...topUp]);
  const after = readContents(contents);
  const gravityChangePoints = before && after ? 1000 * (after.gravity - before.gravity) : 0;
  const abvChangePercent = before && after ? after.abvPercent - before.abvPercent : 0;
  const addedSugar = blend(topUp).extractG;
  const cautions = [
    ...(addedSugar > 1 ? ['The top-up brings sugar: it may work again. Leave room and an airlock.'] : []),
    ...(before && leftL > 0.25 * before.volumeL ? [`${roundDown(leftL, 0.1)} L left is more than a quarter of the batch. Check the figure.`] : []),
  ];
  return {
    contents,
    reading: after,
    left,
    gravityChangePoints,
    abvChangePercent,
    cautions,
    how: RACKING([
      ['volume before', before?.volumeL ?? 0, 'L'],
      ['left on the lees', leftL, 'L'],
      ['topped up with', readContents(blend(topUp))?.volumeL ?? 0, 'L'],
    ]),
  };
}

/** Splits a batch into vessels; what is not taken is the rest (lees, losses). */
export function split(from: Contents, litres: readonly number[]): { parts: readonly Contents[]; rest: Contents } {
  const available = readContents(from)?.volumeL ?? 0;
  const wanted = litres.reduce((a, b) => a + b, 0);
  if (litres.some((l) => !(l > 0)) || wanted > available * (1 + 1e-9)) {
    throw new CellarWorkError(`cannot split ${available.toFixed(2)} L into ${litres.join(' + ')} L`);
  }
  const parts = litres.map((l) => portion(from, l / available));
  const rest = minus(from, blend(parts));
  return { parts, rest: wanted >= available * (1 - 1e-9) ? NOTHING : rest };
}

/** Blends what came from several batches into one vessel. Volumes shrink a little when strong meets weak; the masses do not. */
export function blendInto(parts: readonly Contents[]): Moved {
  const contents = blend(parts);
  return {
    contents,
    reading: readContents(contents),
    how: how(
      'masses of liquid, extract and alcohol add; gravity and strength by Balling’s relation backwards',
      SOURCES.massBalance,
      parts.map((part, i) => [`part ${i + 1}`, roundDown(readContents(part)?.volumeL ?? 0, 0.001), 'L'] as const),
    ),
  };
}
