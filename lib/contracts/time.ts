/** With a leap second, as RFC 3339, 5.6 allows it. */
const LEAP = /^(.{16}):60((?:\.\d+)?(?:[Zz]|[+-]\d{2}:\d{2}))$/;

/** The moment after a month's last second, where that is what `:60` stands for; only there can one be put in. */
function afterLeap(text: string): string | null {
  const [, minute, rest = ''] = LEAP.exec(text) ?? [];
  if (minute === undefined) return null;
  const next = new Date(Date.parse(`${minute}:59${rest.replace(/^\.\d+/, '')}`.toUpperCase()) + 1000);
  return Number.isNaN(next.getTime()) || next.getUTCDate() !== 1 || next.getTime() % 86_400_000 !== 0 ? null : next.toISOString();
}

/**
 * A time of RFC 3339 in the one form that JavaScript reads. Its `T` and `Z` may be
 * small letters (5.6), and a leap second, which no clock here has, counts as the
 * one after it. Anything else comes back as it is.
 */
export function plainTime(text: string): string {
  if (text.includes(':60')) return afterLeap(text) ?? text;
  return /[tz]/.test(text) ? text.replace(/^(\d{4}-\d{2}-\d{2})t/, '$1T').replace(/z$/, 'Z') : text;
}
