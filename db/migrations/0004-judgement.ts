import type { Migration } from './types';

/** The whole picture of the last judgement, so that looking at a batch costs a query and no fit. */
export const up: Migration['up'] = async (run) => {
  // As text: it is read whole or not at all. Null: judged before this column was there.
  await run(`alter table batch_states add column drawing json`);
  // What the judgement was made from; another mark now means that it is out of date.
  await run(`alter table batch_states add column mark text`);
};

export const down: Migration['down'] = async (run) => {
  await run(`alter table batch_states drop column drawing, drop column mark`);
};
