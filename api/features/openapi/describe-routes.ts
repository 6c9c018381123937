import * as z from 'zod/mini';
import { problemSchema, sentenceOf, statusOf, type ErrorCode } from '../../../shared/contract/errors.js';
import { VERSION } from '../../version.js';
import type { Route } from '../route.js';

type Json = Record<string, unknown>;

/** An OpenAPI 3.1 document from the very table that is mounted. */
export function describeRoutes(routes: readonly Route[]) {
  const paths: Record<string, Json> = {};
  for (const line of routes) {
    const path = `/api${line.path.replace(/:(\w+)/g, '{$1}')}`;
    (paths[path] ??= {})[line.method] = describe(line);
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Shedbeat',
      version: VERSION,
      description:
        'Failures are application/problem+json (RFC 9457) with a stable `code`. `x-permission` names what the asker needs.',
    },
    paths,
    components: {
      schemas: { Problem: schemaOf(problemSchema, 'output') },
      securitySchemes: { bearer: { type: 'http', scheme: 'bearer', bearerFormat: 'JWT' } },
    },
  };
}

function describe(line: Route): Json {
  return {
    summary: line.summary,
    operationId: `${line.method}${line.path.replace(/\W+(\w?)/g, (_all, letter: string) => letter.toUpperCase())}`,
    tags: [line.path.split('/')[1]],
    'x-permission': line.permission,
    ...(line.cookie ? { 'x-own-origin': true } : {}),
    ...(line.permission === 'public' ? {} : { security: [{ bearer: [] }] }),
    parameters: [...parametersOf(line.params, 'path'), ...parametersOf(line.query, 'query')],
    ...(line.body
      ? {
          requestBody: {
            required: true,
            content: { 'application/json': { schema: schemaOf(line.body, 'input') } },
          },
        }
      : {}),
    responses: { 200: success(line), ...problems(line) },
  };
}

function success(line: Route): Json {
  if (!line.answer) return { description: line.summary };
  return {
    description: 'Done.',
    content: { 'application/json': { schema: schemaOf(line.answer, 'output') } },
  };
}

/** The route's own codes and those that its kind of route has, by status. */
function problems(line: Route): Json {
  const byStatus = new Map<number, Set<ErrorCode>>();
  for (const code of codesOf(line)) {
    const status = statusOf(code);
    byStatus.set(status, (byStatus.get(status) ?? new Set()).add(code));
  }
  return Object.fromEntries(
    [...byStatus].map(([status, codes]) => [
      status,
      {
        description: [...codes].map((code) => `\`${code}\`: ${sentenceOf(code)}`).join('\n\n'),
        'x-codes': [...codes],
        content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
      },
    ]),
  );
}

function codesOf(line: Route): ErrorCode[] {
  return [
    ...(line.errors ?? []),
    ...(line.cookie ? (['bad-origin'] as const) : []),
    ...(line.body ? (['bad-json', 'too-large'] as const) : []),
    ...(line.body || line.query || line.params ? (['bad-request'] as const) : []),
    ...(line.permission === 'public'
      ? []
      : (['not-signed-in', 'session-ended', 'bad-token', 'not-permitted', 'device-revoked'] as const)),
    ...(line.method === 'get' ? [] : (['busy', 'disk-full', 'closing-down'] as const)),
    'internal',
  ];
}

function parametersOf(shape: z.ZodMiniType | undefined, place: 'path' | 'query'): Json[] {
  if (!shape) return [];
  const { properties = {}, required = [] } = schemaOf(shape, 'input') as {
    properties?: Json;
    required?: string[];
  };
  return Object.entries(properties).map(([name, schema]) => ({
    name,
    in: place,
    required: place === 'path' || required.includes(name),
    schema,
  }));
}

function schemaOf(shape: z.ZodMiniType, io: 'input' | 'output'): Json {
  const schema = z.toJSONSchema(shape, { io, unrepresentable: 'any' });
  // OpenAPI 3.1 names the dialect once for the whole document.
  delete schema.$schema;
  return { ...schema };
}
