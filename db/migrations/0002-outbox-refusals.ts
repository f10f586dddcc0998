import type { Migration } from './types';

/** How often a server said no to a mail, apart from the tries that no server answered. */
export const up: Migration['up'] = async (run) => {
  await run(`alter table outbox add column refusals integer not null default 0`);
};

export const down: Migration['down'] = async (run) => {
  await run(`alter table outbox drop column refusals`);
};
