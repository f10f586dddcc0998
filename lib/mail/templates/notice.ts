import type { Texts } from '../../texts/texts';
import type { LetterContext, NoticeLetter } from '../letters';
import type { Rendered } from '../payload';
import { render, type Block } from '../render';
import { when } from '../words';

/** Title, which is the subject too, and what it means; `about` is the cellar or the address. */
function saidOf({ t }: Texts, what: NoticeLetter['what'], about: string): [title: string, means: string] {
  switch (what) {
    case 'mail-changed':
      return [t('notice.mail-changed'), t('notice.mail-changed.means', { address: about })];
    case 'removed':
    case 'handed-over':
      return [t(`notice.${what}`, { cellar: about }), t(`notice.${what}.means`)];
    case 'webhook-given-up':
      return [t('notice.webhook-given-up', { host: about }), t('notice.webhook-given-up.means')];
    default:
      return [t(`notice.${what}`), t(`notice.${what}.means`)];
  }
}

/** What to do about it. */
function helpOf({ texts: { t }, publicUrl }: LetterContext, what: NoticeLetter['what']): Block[] {
  switch (what) {
    case 'removed':
    case 'handed-over':
    case 'account-deleted':
      return [];
    case 'webhook-given-up':
      return [{ type: 'link', label: t('notice.open-webhooks'), url: `${publicUrl}/settings/webhooks` }];
    default:
      return [
        { type: 'link', label: t('notice.look'), url: `${publicUrl}/settings/security` },
        { type: 'caution', text: t('notice.caution') },
      ];
  }
}

/** Tells of a change to the account, at the address that would want to know. */
export function notice({ what, at, time_zone, about }: NoticeLetter, context: LetterContext): Rendered {
  const { texts } = context;
  const { t } = texts;
  const [title, means] = saidOf(texts, what, about ?? '');
  return render(title, [{ type: 'title', text: t('sentence', { text: title }) }, { type: 'line', text: t('sentence', { text: when(texts, at, context.timeZone ?? time_zone) }) }, { type: 'prose', text: means }, ...helpOf(context, what)], texts);
}
