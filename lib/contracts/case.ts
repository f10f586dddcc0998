/**
 * The wire writes names with underscores, the code without. Both forms have the
 * same shape: these two change the keys and the type, and nothing else. Keys that
 * are data (a map by name) must not pass through here; the wire has lists for those.
 */
type SnakeName<S extends string> = S extends `${infer Head}${infer Tail}` ? (Head extends Lowercase<Head> ? `${Head}${SnakeName<Tail>}` : `_${Lowercase<Head>}${SnakeName<Tail>}`) : S;
type CamelName<S extends string> = S extends `${infer Head}_${infer Tail}` ? `${Head}${Capitalize<CamelName<Tail>>}` : S;

export type SnakeKeys<T> = T extends readonly (infer U)[] ? SnakeKeys<U>[] : T extends object ? { [K in keyof T as K extends string ? SnakeName<K> : K]: SnakeKeys<T[K]> } : T;
export type CamelKeys<T> = T extends readonly (infer U)[] ? CamelKeys<U>[] : T extends object ? { [K in keyof T as K extends string ? CamelName<K> : K]: CamelKeys<T[K]> } : T;

function renamed(value: unknown, rename: (key: string) => string): unknown {
  if (Array.isArray(value)) return value.map((item) => renamed(item, rename));
  if (value === null || typeof value !== 'object') return value;
  return Object.fromEntries(Object.entries(value).map(([key, item]) => [rename(key), renamed(item, rename)]));
}

/** `densityGPerMl` becomes `density_g_per_ml`, at every depth. */
export const snakeKeys = <T>(value: T): SnakeKeys<T> => renamed(value, (key) => key.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`)) as SnakeKeys<T>;

/** `density_g_per_ml` becomes `densityGPerMl`, at every depth. */
export const camelKeys = <T>(value: T): CamelKeys<T> => renamed(value, (key) => key.replace(/_([a-z0-9])/g, (_, letter: string) => letter.toUpperCase())) as CamelKeys<T>;
