import { z } from 'zod';
import { problem } from '../shared/schemas/problem';
import type { Route } from './route';

type Json = Record<string, unknown>;

function jsonSchema(schema: z.ZodType, io: 'input' | 'output'): Json {
  const { $schema: _dialect, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'any' });
  return rest;
}

/** Parameters of an object schema, as OpenAPI lists them one by one. */
function parameters(schema: z.ZodType, where: 'path' | 'query'): Json[] {
  const { properties = {}, required = [] } = jsonSchema(schema, 'input') as {
    properties?: Record<string, Json>;
    required?: string[];
  };
  return Object.entries(properties).map(([name, each]) => ({
    name,
    in: where,
    required: where === 'path' || required.includes(name),
    schema: each,
  }));
}

function answerOf(route: Route): Json {
  if (route.answer === 'nothing') return { description: 'Done' };
  if (route.answer === 'stream') return { description: 'A stream' };
  return { description: 'The answer', content: { 'application/json': { schema: jsonSchema(route.answer, 'output') } } };
}

function operation(route: Route): Json {
  return {
    summary: route.summary,
    'x-access': route.access,
    parameters: [...parameters(route.params, 'path'), ...parameters(route.query, 'query')],
    ...(route.body === null
      ? {}
      : { requestBody: { required: true, content: { 'application/json': { schema: jsonSchema(route.body, 'input') } } } }),
    responses: {
      [String(route.status)]: answerOf(route),
      default: {
        description: 'A refusal as problem details',
        content: { 'application/problem+json': { schema: jsonSchema(problem, 'output') } },
      },
    },
  };
}

/** The OpenAPI 3.1 description of the routes, made from the same schemas that check every request and answer. */
export function describeApi(routes: readonly Route[], version: string): Json {
  const paths: Record<string, Json> = {};
  for (const route of routes) {
    const path = route.path.replace(/:(\w+)/g, '{$1}');
    paths[path] = { ...paths[path], [route.method]: operation(route) };
  }
  return { openapi: '3.1.0', info: { title: 'Idem', version }, paths };
}
