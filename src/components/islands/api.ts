/** What the API said no to: `fields` maps input names to messages. Status 0 is "no answer": offline or cut off. */
export class ApiError extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    message: string,
    readonly fields: Readonly<Record<string, string>> = {},
  ) {
    super(message);
    this.name = 'ApiError';
  }
}

interface ApiOptions {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** A FormData is sent as it is; anything else as JSON. */
  body?: unknown;
  signal?: AbortSignal;
  headers?: Record<string, string>;
}

/** Calls our own JSON API. Throws ApiError on any answer that is not 2xx JSON. */
export async function api<T>(path: string, options: ApiOptions = {}): Promise<T> {
  const answer = await send(path, options);
  const data = await readAnswer(answer);
  if (!answer.ok) throw errorOf(answer.status, data);
  return data as T;
}

async function send(path: string, { method, body, signal, headers = {} }: ApiOptions): Promise<Response> {
  const isForm = body instanceof FormData;
  try {
    return await fetch(path, {
      method: method ?? (body === undefined ? 'GET' : 'POST'),
      headers: { accept: 'application/json', ...(body === undefined || isForm ? {} : JSON_TYPE), ...headers },
      body: payload(body),
      signal: signal ?? null,
      credentials: 'same-origin',
    });
  } catch (error) {
    if (signal?.aborted) throw error;
    throw new ApiError(0, 'OFFLINE', 'No connection. Nothing was sent; try again when you have signal.');
  }
}

const JSON_TYPE = { 'content-type': 'application/json' };

function payload(body: unknown): BodyInit | null {
  if (body === undefined) return null;
  return body instanceof FormData ? body : JSON.stringify(body);
}

// A captive portal answers 200 with HTML: that is not our server speaking.
async function readAnswer(answer: Response): Promise<unknown> {
  if (answer.status === 204) return null;
  if (!answer.headers.get('content-type')?.includes('application/json')) {
    throw new ApiError(answer.status, 'NOT_OURS', 'That answer did not come from Slipband. Check the connection.');
  }
  return answer.json();
}

function errorOf(status: number, data: unknown): ApiError {
  const error = (data as { error?: { code?: string; message?: string; fields?: Record<string, string> } } | null)
    ?.error;
  return new ApiError(
    status,
    error?.code ?? 'UNKNOWN',
    error?.message ?? 'The server gave no reason. Try again.',
    error?.fields ?? {},
  );
}
