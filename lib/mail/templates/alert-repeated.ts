import { batchLink, cellarFoot, evidenceAndAct, stateOf, takeLink, vesselLine } from '../parts';
import type { AlertPayload, RenderContext, Rendered } from '../payload';
import { render } from '../render';
import { bare, lasting, vesselName } from '../words';

/** It still is so, and nobody has said that they have it. */
export function alertRepeated(payload: AlertPayload, context: RenderContext): Rendered {
  const { alert, batch, at } = payload;
  const state = stateOf(alert);
  return render(`${state.word}, still: ${vesselName(batch)}: ${bare(alert.headline)}`, [
    state,
    { type: 'title', text: alert.headline },
    vesselLine(payload),
    { type: 'prose', text: `It has been so for ${lasting(alert.since, at)}, and nobody has it in hand.` },
    ...evidenceAndAct(payload),
    batchLink(payload, context),
    takeLink(payload, context),
    cellarFoot(payload),
  ]);
}
