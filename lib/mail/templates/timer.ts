import type { Texts } from '../../texts/texts';
import { stateBlock } from '../parts';
import type { RenderContext, Rendered, TimerPayload } from '../payload';
import { render, type Block } from '../render';
import { listed, vesselName, when } from '../words';

/** A clock has run down, the minute matters. */
export function timerBlocks({ title, note, due, batch, cellar }: TimerPayload, { publicUrl, texts }: RenderContext): Block[] {
  const { t } = texts;
  return [
    stateBlock(texts, 'Now'),
    { type: 'title', text: title },
    { type: 'line', text: t('timer.due', { where: listed(texts, [vesselName(texts, batch), batch.place]), cellar: cellar.name, due: when(texts, due, cellar.time_zone) }) },
    ...(note === null ? [] : [{ type: 'caution', text: note } as const]),
    { type: 'link', label: t('digest.open-rounds'), url: `${publicUrl}/rounds` },
  ];
}

export const timerSubject = ({ t }: Texts, { title }: TimerPayload): string => t('timer.subject', { title });

export const timerMail = (payload: TimerPayload, context: RenderContext): Rendered =>
  render(timerSubject(context.texts, payload), [...timerBlocks(payload, context), { type: 'foot', text: context.texts.t('timer.foot', { cellar: payload.cellar.name }) }], context.texts);
