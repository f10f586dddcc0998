/** Runs one SQL statement inside the migration's transaction. */
export type Run = (sql: string) => Promise<void>;

export interface Migration {
  up: (run: Run) => Promise<void>;
  down: (run: Run) => Promise<void>;
}
