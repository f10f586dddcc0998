import type { Migration } from './types';

/** What a cellar counts its costs in (ISO 4217); null: figures without a currency, as before. */
export const up: Migration['up'] = async (run) => {
  await run(`alter table cellars add column currency text check (currency ~ '^[A-Z]{3}$')`);
};

export const down: Migration['down'] = async (run) => {
  await run(`alter table cellars drop column currency`);
};
