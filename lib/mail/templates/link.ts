import type { LetterContext, LinkLetter } from '../letters';
import type { Rendered } from '../payload';
import { render } from '../render';

/** Where a link of each kind leads. */
const PATHS: Record<LinkLetter['kind'], string> = { 'sign-in': 'sign-in/link', password: 'sign-in/passphrase', 'mail-old': 'mail-address', 'mail-new': 'mail-address' };

/** What a link does and where it leads; its token stands behind the `#`, which no server and no log sees. */
export function link({ kind, new_email }: LinkLetter, { publicUrl, token, texts }: LetterContext): Rendered {
  const { t } = texts;
  const means = kind === 'mail-old' ? t('link.mail-old.means', { address: new_email ?? t('link.mail-old.another') }) : t(`link.${kind}.means`);
  return render(
    t(`link.${kind}.subject`),
    [
      { type: 'title', text: t(`link.${kind}.title`) },
      { type: 'prose', text: means },
      { type: 'link', label: t(`link.${kind}.go`), url: `${publicUrl}/${PATHS[kind]}#${token}` },
      kind === 'mail-old' ? { type: 'caution', text: t('link.mail-old.caution') } : { type: 'foot', text: t('link.not-you') },
    ],
    texts,
  );
}
