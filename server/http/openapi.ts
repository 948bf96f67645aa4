import { z } from 'zod';
import { problemSchema } from '../contracts/common.ts';
import { calls, type Call } from './calls.ts';

function toJsonSchema(schema: z.ZodType, io: 'input' | 'output') {
  return z.toJSONSchema(schema, { target: 'openapi-3.0', io, unrepresentable: 'any' });
}

function parametersOf(call: Call) {
  const inPath = [...call.path.matchAll(/\{(\w+)\}/g)].map(([, name]) => ({
    name,
    in: 'path',
    required: true,
    schema: { type: 'string' },
  }));
  const query = call.query ? toJsonSchema(call.query, 'input') : undefined;
  const properties = (query?.properties ?? {}) as Record<string, unknown>;
  const inQuery = Object.entries(properties).map(([name, schema]) => ({
    name,
    in: 'query',
    schema,
  }));
  return [...inPath, ...inQuery];
}

function describeCall(call: Call) {
  const problem = {
    description: 'Problem details (RFC 9457)',
    content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
  };
  return {
    summary: call.summary,
    parameters: parametersOf(call),
    ...(call.role === null ? {} : { security: [{ session: [] }], 'x-role': call.role }),
    ...(call.body
      ? {
          requestBody: {
            required: true,
            content: { 'application/json': { schema: toJsonSchema(call.body, 'input') } },
          },
        }
      : {}),
    responses: {
      [String(call.status ?? 200)]: {
        description: 'Done',
        ...(call.answer
          ? { content: { 'application/json': { schema: toJsonSchema(call.answer, 'output') } } }
          : {}),
      },
      default: problem,
    },
  };
}

/** The interface as an OpenAPI 3.0 document. */
export function openApiDocument(publicUrl: string) {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const call of calls) (paths[call.path] ??= {})[call.method] = describeCall(call);
  return {
    openapi: '3.0.3',
    info: { title: 'Tockwell', version: '1' },
    servers: [{ url: publicUrl }],
    paths,
    components: {
      schemas: { Problem: toJsonSchema(problemSchema, 'output') },
      securitySchemes: { session: { type: 'apiKey', in: 'cookie', name: 'tockwell_session' } },
    },
  };
}
