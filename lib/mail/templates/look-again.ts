import { batchLink, cellarFoot, evidenceAndAct, vesselLine } from '../parts';
import type { AlertPayload, RenderContext, Rendered } from '../payload';
import { render } from '../render';
import { bare, vesselName } from '../words';

/** The hour has come at which the reader said they would look again. */
export function lookAgain(payload: AlertPayload, context: RenderContext): Rendered {
  return render(`Look again: ${vesselName(payload.batch)}: ${bare(payload.alert.headline)}`, [
    { type: 'state', word: 'In hand', colour: 'ink2' },
    { type: 'title', text: payload.alert.headline },
    vesselLine(payload),
    { type: 'prose', text: 'You have this in hand and wanted to look again now. It has not passed.' },
    ...evidenceAndAct(payload),
    batchLink(payload, context),
    cellarFoot(payload),
  ]);
}
