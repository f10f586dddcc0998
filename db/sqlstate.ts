/** The five letters by which PostgreSQL names an error (its manual, appendix A), or undefined where it did not speak. */
export function sqlStateOf(error: unknown): string | undefined {
  const holder = error as { code?: unknown; original?: { code?: unknown } } | null | undefined;
  const code = holder?.original?.code ?? holder?.code;
  return typeof code === 'string' && /^[0-9A-Z]{5}$/.test(code) ? code : undefined;
}

/** No partition takes the row (23514 in `readings`, which has no checks of its own). */
export const isMissingPartition = (error: unknown): boolean => sqlStateOf(error) === '23514';

/** The rows themselves are what PostgreSQL cannot take: a data exception, a broken constraint, a limit of the program. */
export const isAboutTheRows = (error: unknown): boolean => /^(22|23|54)/.test(sqlStateOf(error) ?? '');
