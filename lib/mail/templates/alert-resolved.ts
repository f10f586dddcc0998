import { batchLink, cellarFoot, headlineOf } from '../parts';
import type { AlertPayload, RenderContext, Rendered } from '../payload';
import { render } from '../render';
import { lasting, vesselName, when } from '../words';

/** What an alert told is no longer so: one line. A withdrawn "ready to bottle" says what that means. */
export function alertResolved(payload: AlertPayload, context: RenderContext): Rendered {
  const { alert, batch, cellar, at } = payload;
  const { texts } = context;
  const { t } = texts;
  const withdrawn = alert.rule === 'bottle';
  const named = { vessel: vesselName(texts, batch), headline: headlineOf(texts, payload) };
  return render(
    t(withdrawn ? 'alert.subject.withdrawn' : 'alert.subject.passed', named),
    [
      withdrawn ? { type: 'state', word: t('state.not-yet'), colour: 'ink2' } : { type: 'state', word: t('state.cleared'), colour: 'green' },
      { type: 'prose', text: t('alert.passed', { ...named, since: when(texts, alert.since, cellar.time_zone), span: lasting(texts, alert.since, at) }) },
      ...(withdrawn ? [{ type: 'caution', text: t('alert.withdrawn') } as const] : []),
      batchLink(payload, context),
      cellarFoot(payload, context),
    ],
    texts,
  );
}
