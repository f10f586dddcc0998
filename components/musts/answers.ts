import type { Answer } from '@/components/how/AskHow';
import { gravityText, volumeText } from '@/components/ui/units';
import type { MustList } from '@/lib/contracts/musts';
import { how, spell, type InputTuple } from '@/lib/core/how/how';
import { SOURCES } from '@/lib/core/how/sources';

/** What a row of the list promises, each with where it comes from; the sheet itself has every input. */
export function answersOfMust(must: MustList['items'][number]): Answer[] {
  const { original_gravity: og, abv_percent: abv, volume_l: volume } = must;
  const from: InputTuple[] = [
    ['lines of the sheet', must.lines, ''],
    ['version', must.version, ''],
  ];
  return [
    ...(og ? [{ name: 'original gravity', says: gravityText(og.value), how: how('density of a sugar solution of that strength over that of water, 20 °C: the sugar and the water of all lines', SOURCES.icumsa, [...from, ['with its spread', spell(og, 3), 'SG']]) }] : []),
    ...(abv ? [{ name: 'strength', says: `${abv.value.toFixed(1)} %`, how: how('Balling, from the original gravity to where the sugar or the yeast’s tolerance ends it', SOURCES.balling, [...from, ['yeast', must.yeast ?? 'not chosen', ''], ['with its spread', spell(abv, 1), '% vol']]) }] : []),
    ...(volume ? [{ name: 'volume', says: volumeText(volume.value, 1), how: how('mass of water and extract ÷ density of a sugar solution of that strength at 20 °C', SOURCES.icumsa, [...from, ['with its spread', spell(volume, 1), 'L']]) }] : []),
  ];
}
