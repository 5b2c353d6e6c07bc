import * as z from 'zod';
import { problem } from '#shared/contracts/common';
import type { Endpoint } from '#shared/contracts/endpoint';
import type { Route } from './route';

/** The OpenAPI 3.1 description, from the very contracts that validate requests and answers. */
export function describeApi(routes: readonly Route[]): unknown {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const { endpoint } of routes) {
    const path = endpoint.path.replace(/:(\w+)/g, '{$1}');
    (paths[path] ??= {})[endpoint.method.toLowerCase()] = operation(endpoint);
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Centrode',
      version: '1',
      description:
        'SI units; times in UTC. Every change needs X-CSRF-Token (GET /api/session). Errors are RFC 9457 problem details.',
    },
    paths,
    components: { schemas: { Problem: schema(problem, 'output') } },
  };
}

function operation(endpoint: Endpoint): unknown {
  const body =
    endpoint.body instanceof z.ZodUndefined
      ? undefined
      : {
          required: true,
          content: {
            [endpoint.encoding === 'json' ? 'application/json' : 'multipart/form-data']: {
              schema: schema(endpoint.body, 'input'),
            },
          },
        };
  return {
    summary: endpoint.summary,
    'x-access': endpoint.access,
    parameters: [
      ...parameters(endpoint.params, 'path'),
      ...parameters(endpoint.query, 'query'),
      ...(endpoint.ifMatch ? [header('If-Match', 'The version that is edited, quoted')] : []),
      ...(endpoint.idempotent ? [header('Idempotency-Key', 'New for each act')] : []),
    ],
    ...(body ? { requestBody: body } : {}),
    responses: {
      [endpoint.status]: answer(endpoint),
      default: {
        description: 'Problem',
        content: {
          'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } },
        },
      },
    },
  };
}

function answer(endpoint: Endpoint): unknown {
  if (endpoint.response === null) return { description: 'Done' };
  if (endpoint.response === 'binary') {
    return { description: 'The file', content: { 'application/octet-stream': {} } };
  }
  return {
    description: 'The answer',
    content: { 'application/json': { schema: schema(endpoint.response, 'output') } },
  };
}

function parameters(object: z.ZodObject, where: 'path' | 'query'): unknown[] {
  return Object.entries(object.shape).map(([name, type]) => ({
    name,
    in: where,
    required: where === 'path' || !(type as z.ZodType).safeParse(undefined).success,
    schema: schema(type as z.ZodType, 'input'),
  }));
}

const header = (name: string, description: string) => ({
  name,
  in: 'header',
  required: true,
  description,
  schema: { type: 'string' },
});

function schema(type: z.ZodType, io: 'input' | 'output'): unknown {
  const { $schema: _, ...json } = z.toJSONSchema(type, { io, unrepresentable: 'any' });
  return json;
}
