import { z } from 'zod';
import { CAN } from '../domain/permissions';
import { API_OPERATIONS, type ApiOperation } from './api-table';
import { HTTP_STATUS } from './errors';

type Json = Record<string, unknown>;

const JSON_TYPE = 'application/json';

/** The API in OpenAPI 3.1, made from the schemas that check it. */
export function openApiDocument(): Json {
  const paths: Record<string, Json> = {};
  for (const one of API_OPERATIONS) {
    paths[one.path] = { ...paths[one.path], [one.method.toLowerCase()]: operation(one) };
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Slipband',
      version: '1',
      description:
        'SI units: degC, Pa, m, m/s, s; slip in percent against ground speed; settings in the unit of each adjustable; times in UTC. A browser session signs in; every request that changes something needs an Origin of this site.',
    },
    paths,
    components: { schemas: { Error: ERROR_SCHEMA }, securitySchemes: SECURITY },
  };
}

const SECURITY = {
  session: { type: 'apiKey', in: 'cookie', name: '__Host-session' },
};

const ERROR_SCHEMA = {
  type: 'object',
  required: ['error'],
  properties: {
    error: {
      type: 'object',
      required: ['code', 'message'],
      properties: {
        code: { enum: Object.keys(HTTP_STATUS) },
        message: { type: 'string' },
        fields: { type: 'object', additionalProperties: { type: 'string' } },
      },
    },
  },
};

function operation(one: ApiOperation): Json {
  return {
    summary: one.summary,
    ...(one.right === 'public' ? {} : { security: [{ session: [] }] }),
    ...(one.right === null || one.right === 'public' ? {} : { 'x-roles': CAN[one.right] }),
    parameters: [...pathParameters(one.path), ...queryParameters(one.query)],
    ...(one.body ? { requestBody: requestBody(one.body, one.multipart ?? false) } : {}),
    responses: responses(one),
  };
}

function pathParameters(path: string): Json[] {
  return [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => ({
    name,
    in: 'path',
    required: true,
    schema: { type: 'string' },
  }));
}

function queryParameters(query: z.ZodType | undefined): Json[] {
  if (!query) return [];
  const { properties = {}, required = [] } = schemaOf(query) as { properties?: Json; required?: string[] };
  return Object.entries(properties).map(([name, schema]) => ({
    name,
    in: 'query',
    required: required.includes(name),
    schema,
  }));
}

function requestBody(body: z.ZodType, multipart: boolean): Json {
  const schema = schemaOf(body);
  if (!multipart) return { required: true, content: { [JSON_TYPE]: { schema } } };
  const { properties, required } = schema as { properties: Json; required: string[] };
  const file = { type: 'string', format: 'binary' };
  const form = { type: 'object', properties: { file, ...properties }, required: ['file', ...required] };
  return { required: true, content: { 'multipart/form-data': { schema: form } } };
}

function schemaOf(schema: z.ZodType): Json {
  const { $schema: _version, ...rest } = z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' });
  return rest;
}

function responses(one: ApiOperation): Json {
  const error = {
    description: 'Refused',
    content: { [JSON_TYPE]: { schema: { $ref: '#/components/schemas/Error' } } },
  };
  const ok = { description: 'Done', content: { [one.answers ?? JSON_TYPE]: {} } };
  return { [String(one.okStatus ?? 200)]: ok, '4XX': error, '5XX': error };
}
