/** Times as they go over the wire. */
export const iso = (at: Date | number | string): string => new Date(at).toISOString();

export const isoOrNull = (at: Date | number | string | null | undefined): string | null => (at === null || at === undefined ? null : iso(at));
