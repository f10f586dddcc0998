import type { Role } from '@/lib/core/roles';

export const ROLE_WORDS: Record<Role, string> = {
  keeper: 'keeper, runs the cellar',
  brewer: 'brewer, makes batches',
  hand: 'hand, helps on the round',
  guest: 'guest, looks and tastes',
};

/** What each may, in a sentence, for whoever chooses one. */
export const ROLE_MAY: Record<Role, string> = {
  keeper: 'Everything: people, sensors, settings, deletion too.',
  brewer: 'Must sheets, batches, the whole log, bottling, labels, share links.',
  hand: 'Reads, looks, ticks jobs, takes alerts in hand; corrects own entries.',
  guest: 'Looks at batches and bottles, writes tasting notes.',
};
