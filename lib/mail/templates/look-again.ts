import { batchLink, cellarFoot, evidenceAndAct, headlineOf, stateBlock, vesselLine } from '../parts';
import type { AlertPayload, RenderContext, Rendered } from '../payload';
import { render } from '../render';
import { said, vesselName } from '../words';

/** The hour has come at which the reader said they would look again. */
export function lookAgain(payload: AlertPayload, context: RenderContext): Rendered {
  const { texts } = context;
  return render(
    texts.t('alert.subject.look-again', { vessel: vesselName(texts, payload.batch), headline: headlineOf(texts, payload) }),
    [
      stateBlock(texts, 'In hand'),
      { type: 'title', text: said(texts, payload.alert.headline) },
      vesselLine(payload, context),
      { type: 'prose', text: texts.t('alert.look-again') },
      ...evidenceAndAct(payload, context),
      batchLink(payload, context),
      cellarFoot(payload, context),
    ],
    texts,
  );
}
