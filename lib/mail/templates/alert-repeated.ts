import { batchLink, cellarFoot, evidenceAndAct, headlineOf, stateOf, takeLink, vesselLine } from '../parts';
import type { AlertPayload, RenderContext, Rendered } from '../payload';
import { render } from '../render';
import { lasting, said, vesselName } from '../words';

/** It still is so, and nobody has said that they have it. */
export function alertRepeated(payload: AlertPayload, context: RenderContext): Rendered {
  const { alert, batch, at } = payload;
  const { texts } = context;
  const state = stateOf(texts, alert);
  return render(
    texts.t('alert.subject', { state: texts.t('state.still', { state: state.word }), vessel: vesselName(texts, batch), headline: headlineOf(texts, payload) }),
    [
      state,
      { type: 'title', text: said(texts, alert.headline) },
      vesselLine(payload, context),
      { type: 'prose', text: texts.t('alert.still', { span: lasting(texts, alert.since, at) }) },
      ...evidenceAndAct(payload, context),
      batchLink(payload, context),
      takeLink(payload, context),
      cellarFoot(payload, context),
    ],
    texts,
  );
}
