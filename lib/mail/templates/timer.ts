import type { RenderContext, Rendered, TimerPayload } from '../payload';
import { render, type Block } from '../render';
import { vesselName, when } from '../words';

/** A clock has run down, the minute matters. */
export function timerBlocks({ title, note, due, batch, cellar }: TimerPayload, { publicUrl }: RenderContext): Block[] {
  return [
    { type: 'state', word: 'Now', colour: 'madder' },
    { type: 'title', text: title },
    { type: 'line', text: `${vesselName(batch)}${batch.place === null ? '' : `, ${batch.place}`}, ${cellar.name}. Due ${when(due, cellar.time_zone)}.` },
    ...(note === null ? [] : [{ type: 'caution', text: note } as const]),
    { type: 'link', label: 'Open the rounds', url: `${publicUrl}/rounds` },
  ];
}

export const timerSubject = ({ title }: TimerPayload): string => `Now: ${title}`;

export function timerMail(payload: TimerPayload, context: RenderContext): Rendered {
  return render(timerSubject(payload), [...timerBlocks(payload, context), { type: 'foot', text: `${payload.cellar.name}. You put the first dose in, so you are told of the second.` }]);
}
