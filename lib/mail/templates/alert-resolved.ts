import { batchLink, cellarFoot } from '../parts';
import type { AlertPayload, RenderContext, Rendered } from '../payload';
import { render } from '../render';
import { bare, lasting, vesselName, when } from '../words';

/** What an alert told is no longer so: one line. A withdrawn "ready to bottle" says what that means. */
export function alertResolved(payload: AlertPayload, context: RenderContext): Rendered {
  const { alert, batch, cellar, at } = payload;
  const withdrawn = alert.rule === 'bottle';
  const line = `${vesselName(batch)}: “${bare(alert.headline)}” has passed. It was so from ${when(alert.since, cellar.time_zone)}, for ${lasting(alert.since, at)}.`;
  return render(`${withdrawn ? 'No longer so' : 'Passed'}: ${vesselName(batch)}: ${bare(alert.headline)}`, [
    withdrawn ? { type: 'state', word: 'Not yet', colour: 'ink2' } : { type: 'state', word: 'Cleared', colour: 'green' },
    { type: 'prose', text: line },
    ...(withdrawn ? [{ type: 'caution', text: 'Do not bottle it now. If some is in bottles, keep them cold and away from people, and read the batch’s page before you touch them.' } as const] : []),
    batchLink(payload, context),
    cellarFoot(payload),
  ]);
}
