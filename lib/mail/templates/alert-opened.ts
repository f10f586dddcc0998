import { batchLink, cellarFoot, evidenceAndAct, stateOf, takeLink, vesselLine } from '../parts';
import type { AlertPayload, RenderContext, Rendered } from '../payload';
import { render } from '../render';
import { bare, vesselName } from '../words';

/** Something has begun that a person should know. */
export function alertOpened(payload: AlertPayload, context: RenderContext): Rendered {
  const state = stateOf(payload.alert);
  return render(`${state.word}: ${vesselName(payload.batch)}: ${bare(payload.alert.headline)}`, [
    state,
    { type: 'title', text: payload.alert.headline },
    vesselLine(payload),
    ...evidenceAndAct(payload),
    batchLink(payload, context),
    takeLink(payload, context),
    cellarFoot(payload),
  ]);
}
