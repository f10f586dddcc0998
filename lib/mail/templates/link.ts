import type { LetterContext, LinkLetter } from '../letters';
import type { Rendered } from '../payload';
import { render, type Block } from '../render';

const NOT_YOU: Block = { type: 'foot', text: 'If you did not ask for this, leave it be: nothing changes, and the link stops by itself. Nobody from Fallbright ever asks for it.' };

/** What a link does and where it leads; its token stands behind the `#`, which no server and no log sees. */
export function link({ kind, new_email }: LinkLetter, { publicUrl, token }: LetterContext): Rendered {
  switch (kind) {
    case 'sign-in':
      return render('Your link to sign in', [
        { type: 'title', text: 'Sign in to Fallbright' },
        { type: 'prose', text: 'The link opens a page with one button. It works once, for 10 min.' },
        { type: 'link', label: 'Sign in', url: `${publicUrl}/sign-in/link#${token}` },
        NOT_YOU,
      ]);
    case 'password':
      return render('Choose a new passphrase', [
        { type: 'title', text: 'Choose a new passphrase' },
        { type: 'prose', text: 'The link opens a page where you choose it. It works once, for 10 min. Choosing it ends every sign-in that is open.' },
        { type: 'link', label: 'Choose a passphrase', url: `${publicUrl}/sign-in/passphrase#${token}` },
        NOT_YOU,
      ]);
    case 'mail-old':
      return render('Confirm that your mail address changes', [
        { type: 'title', text: 'Change your mail address' },
        { type: 'prose', text: `Somebody signed in as you asks to change it to ${new_email ?? 'another'}. It changes once this link and the one sent to the new address have both been used, within a day.` },
        { type: 'link', label: 'Confirm the change', url: `${publicUrl}/mail-address#${token}` },
        { type: 'caution', text: 'If it was not you, do not use the link. Choose a new passphrase instead: it ends every open sign-in and this change.' },
      ]);
    case 'mail-new':
      return render('Confirm your new mail address', [
        { type: 'title', text: 'Is this your address?' },
        { type: 'prose', text: 'An account of Fallbright asks to use this address from now on. It changes once this link and the one sent to the old address have both been used, within a day.' },
        { type: 'link', label: 'Confirm the address', url: `${publicUrl}/mail-address#${token}` },
        NOT_YOU,
      ]);
  }
}
