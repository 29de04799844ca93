import type { APIContext, APIRoute } from 'astro';
import { ZodError, type ZodType } from 'zod';
import { isBusy } from '@/db/client';
import type { ServerContext } from './context';
import { AppError, notFound, validationError } from './errors';
import { contextFromLocals } from './locals';
import { logError } from './log';

const JSON_LIMIT_BYTES = 256 * 1024;

const PRIVATE_HEADERS = { 'cache-control': 'no-store', 'content-type': 'application/json; charset=utf-8' };

export function json(data: unknown, status = 200): Response {
  return new Response(JSON.stringify(data), { status, headers: PRIVATE_HEADERS });
}

/** The one mapper from a thrown error to what may be shown. Unknown errors are logged with the request id, never shown. */
export function shownError(error: unknown, requestId: string): AppError {
  const known = asAppError(error);
  if (known) return known;
  logError('unexpected error', error, requestId);
  if (isBusy(error))
    return new AppError('UNAVAILABLE', 'The database is busy. Nothing was stored: try again in a moment.');
  return new AppError('INTERNAL', `Something went wrong on our side. Nothing was stored. Request ${requestId}.`);
}

/** The same as a JSON answer; a wait is told in Retry-After. */
export function errorResponse(error: unknown, requestId: string): Response {
  const { code, message, fields, status, retryAfterS } = shownError(error, requestId);
  const response = json({ error: { code, message, ...(fields ? { fields } : {}) } }, status);
  if (retryAfterS !== undefined) response.headers.set('retry-after', String(retryAfterS));
  return response;
}

/** Turns zod failures into a VALIDATION error with one message per field; passes AppErrors through; null for the unknown. */
export function asAppError(error: unknown): AppError | null {
  if (error instanceof AppError) return error;
  return error instanceof ZodError ? fromZod(error) : null;
}

function fromZod({ issues }: ZodError): AppError {
  const fields: Record<string, string> = {};
  for (const { code, path, message } of issues) {
    const wholeBody = path.length === 0 && code === 'invalid_type';
    fields[path.join('.') || 'body'] ??= wholeBody ? 'Send the fields as one object.' : message;
  }
  return validationError(Object.values(fields)[0] ?? 'The input was not understood.', fields);
}

type Handler = (ctx: ServerContext, call: APIContext) => Promise<unknown> | unknown;

/** An endpoint for signed-in members: builds the context, runs the verb, answers JSON (or the Response it returns). */
export function teamRoute(handler: Handler, okStatus = 200): APIRoute {
  return openRoute((call) => handler(contextFromLocals(call.locals), call), okStatus);
}

/** An endpoint that needs nobody signed in. */
export function openRoute(handler: (call: APIContext) => Promise<unknown> | unknown, okStatus = 200): APIRoute {
  return async (call) => {
    try {
      const result = await handler(call);
      return result instanceof Response ? result : json(result ?? { ok: true }, okStatus);
    } catch (error) {
      return errorResponse(error, call.locals.requestId);
    }
  };
}

const MAX_ID_LENGTH = 64;

/** An id from the path. One that no row can have is the same 404 as a missing row. */
export function pathId({ params }: Pick<APIContext, 'params'>, name = 'id'): string {
  const id = params[name] ?? '';
  if (id === '' || id.length > MAX_ID_LENGTH) throw notFound('item');
  return id;
}

/** Reads a JSON body within the size limit; the verb checks it. Throws VALIDATION or TOO_LARGE. */
export async function readRaw(request: Request): Promise<unknown> {
  const text = new TextDecoder().decode(await readBody(request, JSON_LIMIT_BYTES));
  try {
    return JSON.parse(text);
  } catch {
    throw validationError('The body is not valid JSON.');
  }
}

/** Reads a JSON body and checks it. Throws VALIDATION or TOO_LARGE. */
export async function readJson<T>(request: Request, schema: ZodType<T>): Promise<T> {
  return schema.parse(await readRaw(request));
}

/** Reads a body while counting: a declared or real size over the limit is refused before it is kept. */
export async function readBody(request: Request, limitBytes: number): Promise<Uint8Array<ArrayBuffer>> {
  const tooLarge = () => new AppError('TOO_LARGE', `The body is over ${Math.floor(limitBytes / 1024)} kB.`);
  if (Number(request.headers.get('content-length') ?? 0) > limitBytes) throw tooLarge();
  const chunks: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of request.body ?? []) {
    size += (chunk as Uint8Array).byteLength;
    if (size > limitBytes) throw tooLarge();
    chunks.push(chunk as Uint8Array);
  }
  return Buffer.concat(chunks);
}
