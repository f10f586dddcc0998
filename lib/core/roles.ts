/** The four roles that a person can have in a cellar, most allowed first. */
export const ROLES = ['keeper', 'brewer', 'hand', 'guest'] as const;
export type Role = (typeof ROLES)[number];
