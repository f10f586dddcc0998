import type { LetterContext, NoticeLetter } from '../letters';
import type { Rendered } from '../payload';
import { render, type Block } from '../render';
import { when } from '../words';

/** Subject, title, and what it means; `about` is the cellar or the address. */
const SAYS: Record<NoticeLetter['what'], (about: string) => { title: string; means: string }> = {
  'password-changed': () => ({ title: 'Your passphrase was changed', means: 'Every other sign-in of yours has ended.' }),
  'second-factor-on': () => ({ title: 'A second factor was set up', means: 'Signing in asks for a code of your authenticator from now on.' }),
  'second-factor-off': () => ({ title: 'The second factor was taken off', means: 'Signing in asks for no code any more.' }),
  'recovery-code-used': () => ({ title: 'A recovery code was used', means: 'Somebody signed in to your account with one of the recovery codes. That code is used up.' }),
  'mail-changed': (about) => ({ title: 'Your mail address was changed', means: `The account uses ${about} from now on.` }),
  'account-deleted': () => ({ title: 'Your account was deleted', means: 'What you logged stays in the cellars’ logs without your name.' }),
  removed: (about) => ({ title: `You no longer share the cellar ${about}`, means: 'A keeper has taken you out. Your tokens and calendar address for it have stopped.' }),
  'handed-over': (about) => ({ title: `You keep the cellar ${about} now`, means: 'Its keeper has handed it over to you: people, sensors and settings are yours to run.' }),
  'webhook-given-up': (about) => ({ title: `The webhook to ${about} was switched off`, means: 'Nothing arrived there for five days. What is owed from now on is not sent. Switch it on again once something listens.' }),
};

/** Where to do something about it. */
const LEADS: Partial<Record<NoticeLetter['what'], { label: string; path: string }>> = { 'webhook-given-up': { label: 'Open the webhooks', path: '/settings/webhooks' } };

const HARMLESS: ReadonlySet<NoticeLetter['what']> = new Set(['removed', 'handed-over', 'account-deleted', 'webhook-given-up']);

/** Tells of a change to the account, at the address that would want to know. */
export function notice({ what, at, time_zone, about }: NoticeLetter, { publicUrl }: LetterContext): Rendered {
  const { title, means } = SAYS[what](about ?? '');
  const leads = LEADS[what];
  const help: Block[] = HARMLESS.has(what)
    ? leads ? [{ type: 'link', label: leads.label, url: `${publicUrl}${leads.path}` }] : []
    : [
        { type: 'link', label: 'Look at your sign-ins', url: `${publicUrl}/settings/security` },
        { type: 'caution', text: 'If it was not you: choose a new passphrase at once (“Forgot it?” on the sign-in page). That ends every open sign-in.' },
      ];
  return render(title, [{ type: 'title', text: `${title}.` }, { type: 'line', text: `${when(at, time_zone)}.` }, { type: 'prose', text: means }, ...help]);
}
