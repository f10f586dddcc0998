import type { Role } from '@/lib/core/roles';

export const ROLE_WORDS: Record<Role, string> = {
  keeper: 'keeper, runs the cellar',
  brewer: 'brewer, makes batches',
  hand: 'hand, helps on the round',
  guest: 'guest, looks and tastes',
};
