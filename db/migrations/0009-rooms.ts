import type { Migration } from './types';

/** Where a room probe hangs; the batches standing there share its temperature. */
export const up: Migration['up'] = async (run) => {
  await run(`alter table sensors add column place text check (char_length(place) between 1 and 80)`);
};

export const down: Migration['down'] = async (run) => {
  await run(`alter table sensors drop column place`);
};
