/** What an import counts, in the order in which people ask; `one` where it is not the word less its s. */
const ORDER = ['batches', 'entries', 'readings', 'must sheets', 'lots', 'tasting notes', 'places', 'jobs', 'photos', 'doubled', 'refused'] as const;
const ONE: Readonly<Record<string, string>> = { batches: 'batch', entries: 'entry', doubled: 'doubled', refused: 'refused' };

const placeOf = (name: string) => {
  const place = (ORDER as readonly string[]).indexOf(name);
  return place === -1 ? ORDER.length : place;
};

/** `16 batches, 71 entries, 26 846 readings`: thousands apart, as it is read. */
export function countWords(counts: Readonly<Record<string, number>>): string {
  return Object.entries(counts)
    .sort(([a], [b]) => placeOf(a) - placeOf(b))
    .map(([name, count]) => `${String(count).replace(/\B(?=(\d{3})+$)/g, ' ')} ${count === 1 ? (ONE[name] ?? name.replace(/s$/, '')) : name}`)
    .join(', ');
}
