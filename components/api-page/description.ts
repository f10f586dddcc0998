/** What the page needs of an OpenAPI description. */
export interface Operation {
  id: string;
  method: string;
  path: string;
  summary: string;
  access: string;
  parameters: { name: string; in: 'path' | 'query'; required: boolean; schema: unknown }[];
  body: unknown;
  answer: unknown;
  status: string;
}

interface Described {
  operationId: string;
  summary: string;
  'x-access'?: string;
  parameters?: Operation['parameters'];
  requestBody?: { content?: Record<string, { schema?: unknown }> };
  responses?: Record<string, { content?: Record<string, { schema?: unknown }> }>;
}

const METHODS = ['get', 'post', 'patch', 'delete'] as const;
const schemaIn = (content: Record<string, { schema?: unknown }> | undefined) => Object.values(content ?? {})[0]?.schema ?? null;

/** The calls of a description, by path and then by method. */
export function operationsOf(description: { paths: Record<string, Record<string, Described>> }): Operation[] {
  return Object.entries(description.paths).flatMap(([path, item]) =>
    METHODS.flatMap((method) => {
      const operation = item[method];
      if (!operation) return [];
      const [status = '200', good] = Object.entries(operation.responses ?? {}).find(([code]) => code.startsWith('2')) ?? [];
      return [{ id: operation.operationId, method: method.toUpperCase(), path, summary: operation.summary, access: operation['x-access'] ?? 'anyone', parameters: operation.parameters ?? [], body: schemaIn(operation.requestBody?.content), answer: schemaIn(good?.content), status }];
    }),
  );
}

/** The first word of a path below the version: what it is about. */
export const groupOf = (path: string): string => path.split('/')[3]?.replace(/\..*$/, '') ?? '';

/** A path with its parts and its query filled in; what is left empty stays out. */
export function filled(operation: Pick<Operation, 'path' | 'parameters'>, values: Readonly<Record<string, string>>): string {
  const path = operation.path.replace(/\{(\w+)\}/g, (_whole, name: string) => encodeURIComponent(values[name] ?? ''));
  const query = operation.parameters.filter((parameter) => parameter.in === 'query' && (values[parameter.name] ?? '') !== '').map((parameter) => [parameter.name, values[parameter.name]!]);
  return query.length === 0 ? path : `${path}?${new URLSearchParams(query).toString()}`;
}
