import type { InvitationLetter, LetterContext } from '../letters';
import type { Rendered } from '../payload';
import { render } from '../render';
import { when } from '../words';

/** Somebody asks somebody else to share a cellar. */
export function invitation({ cellar, by, role, expires_at, time_zone }: InvitationLetter, { publicUrl, token, texts, timeZone }: LetterContext): Rendered {
  const { t } = texts;
  return render(
    t('invitation.subject', { by, cellar }),
    [
      { type: 'title', text: t('invitation.title', { cellar }) },
      { type: 'prose', text: t(`invitation.${role}`, { by }) },
      { type: 'link', label: t('invitation.look'), url: `${publicUrl}/invitation#${token}` },
      { type: 'line', text: t('invitation.until', { until: when(texts, expires_at, timeZone ?? time_zone) }) },
      { type: 'foot', text: t('invitation.foot') },
    ],
    texts,
  );
}
