import { batchLink, cellarFoot, evidenceAndAct, headlineOf, stateOf, takeLink, vesselLine } from '../parts';
import type { AlertPayload, RenderContext, Rendered } from '../payload';
import { render } from '../render';
import { said, vesselName } from '../words';

/** Something has begun that a person should know. */
export function alertOpened(payload: AlertPayload, context: RenderContext): Rendered {
  const { texts } = context;
  const state = stateOf(texts, payload.alert);
  return render(
    texts.t('alert.subject', { state: state.word, vessel: vesselName(texts, payload.batch), headline: headlineOf(texts, payload) }),
    [state, { type: 'title', text: said(texts, payload.alert.headline) }, vesselLine(payload, context), ...evidenceAndAct(payload, context), batchLink(payload, context), takeLink(payload, context), cellarFoot(payload, context)],
    texts,
  );
}
