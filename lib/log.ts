import pino from 'pino';
import { env } from './config/env';

/** Fields that must never reach a log line. */
const SECRETS = ['password', 'passphrase', 'secret', 'token', 'authorization', 'cookie', '*.password', '*.passphrase', '*.secret', '*.token', '*.authorization', '*.cookie'];

/** Where the database's errors hold what was to be written or was looked for: hashes, addresses, whole rows. */
const VALUES: ReadonlySet<string> = new Set(['parameters', 'detail', 'errors', 'fields', 'value', 'instance', 'where', 'internalQuery', 'parent']);
const LONGEST_SQL = 2_000;

function withoutValues(line: Record<string, unknown>): Record<string, unknown> {
  const kept = Object.fromEntries(Object.entries(line).filter(([name]) => !VALUES.has(name)));
  // Sequelize writes what it looks for into the statement itself.
  if (typeof kept.sql === 'string') kept.sql = kept.sql.slice(0, LONGEST_SQL).replace(/'(?:[^']|'')*('|$)/g, "'…'");
  if (typeof kept.original === 'object' && kept.original !== null) kept.original = withoutValues(kept.original as Record<string, unknown>);
  if (Array.isArray(kept.aggregateErrors)) kept.aggregateErrors = kept.aggregateErrors.map((one: object) => withoutValues({ ...one }));
  return kept;
}

/** An error as a line of the log has it: what went wrong and where, and no word of the data. */
export const errorLine = (error: unknown): unknown => (error instanceof Error ? withoutValues({ ...pino.stdSerializers.err(error) }) : error);

/** JSON lines on stdout; pino escapes control characters, so a name cannot forge a line. */
export const log = pino({ level: env().LOG_LEVEL, redact: SECRETS, serializers: { err: errorLine }, base: undefined });

/** A logger whose lines say which part of the house speaks. */
export const logFor = (part: string) => log.child({ part });
