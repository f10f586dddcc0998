import type { Action } from '@/lib/core/actions';

/** A page of the settings. */
export interface Section {
  href: `/settings/${string}`;
  name: string;
  /** What is there, in a few words, for the page that lists them. */
  says: string;
  of: 'You' | 'The cellar';
  /** Shown to those who may do this here; absent: to every member. */
  needs?: Action;
}

/** In the order they are shown. A new page of the settings is one line here and its route below `app/(cellar)/settings`. */
export const SECTIONS: readonly Section[] = [
  { href: '/settings/profile', name: 'Profile', says: 'name, units, time zone, your data', of: 'You' },
  { href: '/settings/security', name: 'Sign-in', says: 'passphrase, mail address, second factor, where you are signed in', of: 'You' },
  { href: '/settings/tokens', name: 'API tokens', says: 'keys for your own programs', of: 'You' },
  { href: '/settings/cellar', name: 'Cellar', says: 'its name, clock and currency, your others, leave it, make another', of: 'The cellar' },
  { href: '/settings/people', name: 'People', says: 'who shares it, in which role, who is invited', of: 'The cellar', needs: 'members.read' },
  { href: '/settings/shares', name: 'Share links', says: 'addresses that show one batch to anybody', of: 'The cellar', needs: 'shares.manage' },
  { href: '/settings/audit', name: 'Audit trail', says: 'who did what, when, from where', of: 'The cellar', needs: 'audit.read' },
  { href: '/settings/messages', name: 'Messages', says: 'what you hear of, when, and by which means; who is told next', of: 'You', needs: 'alerts.read' },
  { href: '/settings/sensors', name: 'Sensors', says: 'when a cell, a link or a clock is worth a word', of: 'The cellar', needs: 'sensors.read' },
  { href: '/settings/data', name: 'Data', says: 'take all of it out, bring logs and old batches in', of: 'The cellar', needs: 'data.import' },
  { href: '/settings/webhooks', name: 'Webhooks', says: 'other programs that are told of changes', of: 'The cellar', needs: 'webhooks.manage' },
  { href: '/settings/api', name: 'API', says: 'what programs can ask, to read and to try', of: 'The cellar' },
];

export const sectionsFor = (may: (action: Action) => boolean): Section[] => SECTIONS.filter(({ needs }) => needs === undefined || may(needs));
