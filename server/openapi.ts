import type { Route } from './routes/route';
import { productVersion } from './product';
import { schemas, type SchemaName } from './schemas';

type Json = unknown;

const component = (name: string): string =>
  name.replace(/(^|-)([a-z])/g, (_, _dash, letter: string) => letter.toUpperCase());

/** A reference between schema files becomes one between the components of the description. */
function moved(reference: string, from: string): string {
  const [file, rest = ''] = reference.split('#');
  return `#/components/schemas/${file ? component(file.replace('.schema.json', '')) : from}${rest}`;
}

function withMovedReferences(value: Json, from: string): Json {
  if (Array.isArray(value)) return value.map((item: Json) => withMovedReferences(item, from));
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value as Record<string, Json>).filter(([key]) => key !== '$schema' && key !== '$id');
  return Object.fromEntries(
    entries.map(([key, inner]) =>
      key === '$ref' && typeof inner === 'string' ? [key, moved(inner, from)] : [key, withMovedReferences(inner, from)],
    ),
  );
}

const described = Object.fromEntries(
  Object.entries(schemas).map(([name, schema]) => [component(name), withMovedReferences(schema, component(name))]),
);

const reference = (name: SchemaName) => ({ $ref: `#/components/schemas/${component(name)}` });

const parameter = (name: string, where: 'path' | 'query' | 'header') => ({
  name,
  in: where,
  required: where !== 'query',
  schema: { type: 'string' },
});

function parametersOf({ path, query = [], ifMatch }: Route) {
  const names = [...path.matchAll(/:(\w+)/g)].map(([, name]) => name!);
  return [
    ...names.map((name) => parameter(name, 'path')),
    ...query.map((name) => parameter(name, 'query')),
    ...(ifMatch ? [parameter('If-Match', 'header')] : []),
  ];
}

function requestBodyOf({ body, textBody }: Route) {
  if (!body && !textBody) return {};
  const json = body ? { 'application/json': { schema: reference(body) } } : {};
  const text = Object.fromEntries((textBody ?? []).map((media) => [media, { schema: { type: 'string' } }]));
  return { requestBody: { required: true, content: { ...json, ...text } } };
}

function operationOf(route: Route) {
  const { summary, allowed, status = 200, answers = 'application/json' } = route;
  const problem = { description: 'Problem', content: { 'application/problem+json': { schema: reference('problem') } } };
  const success = status === 204 ? { description: 'Done' } : { description: 'Success', content: { [answers]: {} } };
  return {
    summary,
    description: allowed === 'open' ? 'For everyone.' : `For ${allowed.join(', ')}.`,
    security: allowed === 'open' ? [] : [{ bearer: [] }],
    parameters: parametersOf(route),
    ...requestBodyOf(route),
    responses: { [status]: success, default: problem },
  };
}

/** The description of the API, OpenAPI 3.1, of the same table that mounts it. */
export function openApi(routes: readonly Route[]): object {
  const paths: Record<string, Record<string, Json>> = {};
  for (const route of routes) {
    const path = route.path.replace(/:(\w+)/g, '{$1}');
    paths[path] = { ...paths[path], [route.method]: operationOf(route) };
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Keepstep', version: productVersion },
    servers: [{ url: '/api/v1' }],
    paths,
    components: {
      schemas: described,
      securitySchemes: { bearer: { type: 'http', scheme: 'bearer', bearerFormat: 'JWT' } },
    },
  };
}
