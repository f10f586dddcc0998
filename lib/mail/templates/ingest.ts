import { stateBlock } from '../parts';
import type { IngestPayload, RenderContext, Rendered } from '../payload';
import { render, type Block } from '../render';
import { lasting, when } from '../words';

const SUBJECTS = { opened: 'ingest.subject', repeated: 'ingest.subject.still', resolved: 'ingest.subject.passed' } as const;

/** The house itself takes no readings, or takes them again. */
export function ingestMail({ event, since, at, time_zone }: IngestPayload, { publicUrl, texts }: RenderContext): Rendered {
  const { t } = texts;
  const spanned = { since: when(texts, since, time_zone), span: lasting(texts, since, at) };
  const link: Block = { type: 'link', label: t('ingest.open-sensors'), url: `${publicUrl}/sensors` };
  const told: Block[] =
    event === 'resolved'
      ? [{ type: 'state', word: t('state.cleared'), colour: 'green' }, { type: 'prose', text: t('ingest.passed', spanned) }, link]
      : [
          stateBlock(texts, 'Check'),
          { type: 'title', text: t('ingest.title') },
          { type: 'line', text: t('ingest.since', spanned) },
          { type: 'prose', text: t('ingest.means') },
          { type: 'part', label: t('alert.do-first'), text: t('ingest.first') },
          link,
          { type: 'foot', text: t('ingest.foot') },
        ];
  return render(t(SUBJECTS[event]), told, texts);
}
