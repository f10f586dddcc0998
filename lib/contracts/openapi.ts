import { z } from 'zod';
import { problem } from './common';
import { endpoints, type Endpoint } from './endpoints';

/** Statuses every signed-in endpoint may answer with, beside its own. */
const REFUSALS: Array<[number, string]> = [
  [401, 'Not signed in'],
  [403, 'The role does not allow it'],
  [404, 'No such thing in this cellar'],
  [422, 'Some values are wrong; `errors` says which'],
  [503, 'The database does not answer'],
];

const schemaOf = (schema: z.ZodType, io: 'input' | 'output') => z.toJSONSchema(schema, { io, target: 'draft-2020-12', unrepresentable: 'any' });

function parameters(endpoint: Endpoint): unknown[] {
  const list = (schema: z.ZodType | undefined, place: 'path' | 'query') => {
    if (!schema) return [];
    const { properties = {}, required = [] } = schemaOf(schema, 'input') as { properties?: Record<string, unknown>; required?: string[] };
    return Object.entries(properties).map(([name, shape]) => ({ name, in: place, required: place === 'path' || required.includes(name), schema: shape }));
  };
  return [...list(endpoint.params, 'path'), ...list(endpoint.query, 'query')];
}

/** A personal token does for all but what a person does for themself. */
function securityOf({ access, by }: Endpoint): Array<Record<string, []>> {
  if (access === 'anyone') return [];
  if (access === 'sensor') return [{ sensor: [] }];
  return access === 'person' || by === 'session' ? [{ session: [] }] : [{ session: [] }, { token: [] }];
}

const PROBLEM = { content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } } };

function requestBody({ body, file }: Endpoint): Record<string, unknown> {
  if (body) return { requestBody: { required: true, content: { 'application/json': { schema: schemaOf(body, 'input') } } } };
  return file ? { requestBody: { required: true, content: Object.fromEntries(file.map((type) => [type, {}])) } } : {};
}

function operation(name: string, endpoint: Endpoint): Record<string, unknown> {
  const content = endpoint.response && { content: { 'application/json': { schema: schemaOf(endpoint.response, 'output') } } };
  const refusals = endpoint.access === 'anyone' ? [] : REFUSALS;
  return {
    operationId: name,
    summary: endpoint.summary,
    security: securityOf(endpoint),
    ...(endpoint.access !== 'anyone' && { 'x-access': endpoint.access }),
    parameters: parameters(endpoint),
    ...requestBody(endpoint),
    responses: {
      [endpoint.status]: { description: 'As asked', ...content },
      ...Object.fromEntries(refusals.map(([status, description]) => [status, { description, ...PROBLEM }])),
      default: { description: 'Whatever else is in the way; `type` says what', ...PROBLEM },
    },
  };
}

/** The web API as OpenAPI 3.1, from the same schemas that check its requests. */
export function openApi(sessionCookie: string): Record<string, unknown> {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const [name, endpoint] of Object.entries(endpoints) as Array<[string, Endpoint]>) (paths[`/api/v1${endpoint.path}`] ??= {})[endpoint.method.toLowerCase()] = operation(name, endpoint);
  return {
    openapi: '3.1.0',
    info: { title: 'Fallbright', version: '1', description: 'The watch kept over small fermentations. Times are RFC 3339 UTC, gravities SG at 20 °C/20 °C, temperatures °C, volumes L.' },
    paths,
    components: {
      schemas: { Problem: schemaOf(problem, 'output') },
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: sessionCookie },
        token: { type: 'http', scheme: 'bearer', description: '`Authorization: Bearer fbt_…`: a personal token, for one cellar and at most its person’s role there' },
        sensor: { type: 'http', scheme: 'bearer', description: '`Authorization: Bearer <sensor>:<secret>`' },
      },
    },
  };
}
