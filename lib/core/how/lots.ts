/** Where the figures of a lot come from, as the cellar book and the lot's own page tell them. */
import { how, type How, type InputTuple } from './how';
import { SOURCES } from './sources';

interface Bottled {
  originalGravity: number | null;
  finalGravity: number | null;
}

const gravities = (lot: Bottled): InputTuple[] => [
  ['original gravity, with what was added', lot.originalGravity, 'SG'],
  ['final gravity', lot.finalGravity, 'SG'],
];

export const howOfLotStrength = (lot: Bottled, sugar: string): How =>
  how('Balling from the gravity with all the sugar that went in and the last hydrometer reading, each good to half a division, and what the sugar for fizz adds', SOURCES.balling, [...gravities(lot), ['sugar for fizz', sugar, '']]);

export const howOfLotGravity = (lot: Bottled): How =>
  how('first: the must’s gravity with all the sugar that went in until it was bottled; last: the hydrometer reading that it was bottled by', SOURCES.told, gravities(lot));

export const howOfLotCost = (inputs: readonly InputTuple[], litres: number): How =>
  how('part of the must sheet’s cost that is in these bottles + what the bottling cost, ÷ litres bottled; one bottle by its size', SOURCES.told, [...inputs, ['bottled', litres, 'L']]);

/** Of counts of bottles. */
export const HOW_COUNTED: How = how('bottled: as the bench planned it when it was bottled; left: those, less what was written down as opened, given away, broken or gushed, and not put back', SOURCES.told);

/** Where an average of tasting notes comes from. */
export const HOW_TASTED: How = how('mean of those who gave a figure; after the ± their standard deviation, from two on', SOURCES.told);
