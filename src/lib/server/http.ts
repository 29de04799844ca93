import type { APIContext, APIRoute } from 'astro';
import { ZodError, type ZodType } from 'zod';
import type { ServerContext } from './context';
import { AppError, validationError } from './errors';
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
  if (error instanceof ZodError) {
    const fields = Object.fromEntries(
      error.issues.map((issue) => [issue.path.join('.') || 'body', issue.message] as const).reverse(),
    );
    return validationError(Object.values(fields)[0] ?? 'The input was not understood.', fields);
  }
  return null;
}

type Handler = (ctx: ServerContext, call: APIContext) => Promise<unknown> | unknown;

/** An endpoint for signed-in members: builds the context, runs the verb, answers JSON (or the Response it returns). */
export function teamRoute(handler: Handler, okStatus = 200): APIRoute {
  return async (call) => {
    try {
      const result = await handler(contextFromLocals(call.locals), call);
      return result instanceof Response ? result : json(result ?? { ok: true }, okStatus);
    } catch (error) {
      return errorResponse(error, call.locals.requestId);
    }
  };
}

/** Reads a JSON body within the size limit and checks it. Throws VALIDATION or TOO_LARGE. */
export async function readJson<T>(request: Request, schema: ZodType<T>): Promise<T> {
  const text = new TextDecoder().decode(await readBody(request, JSON_LIMIT_BYTES));
  let data: unknown;
  try {
    data = JSON.parse(text);
  } catch {
    throw validationError('The body is not valid JSON.');
  }
  return schema.parse(data);
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
