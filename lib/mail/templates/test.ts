import type { RenderContext, Rendered, TestPayload } from '../payload';
import { render } from '../render';
import { when } from '../words';

/** Sent because somebody asked whether messages arrive. */
export function testMail({ at, time_zone }: TestPayload, { publicUrl, texts }: RenderContext): Rendered {
  const { t } = texts;
  return render(
    t('test.subject'),
    [
      { type: 'title', text: t('test.title') },
      { type: 'prose', text: t('test.asked', { when: when(texts, at, time_zone) }) },
      { type: 'link', label: t('test.open-messages'), url: `${publicUrl}/settings/messages` },
    ],
    texts,
  );
}
