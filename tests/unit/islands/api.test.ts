import { afterEach, describe, expect, it, vi } from 'vitest';
import { ApiError, api } from '@/components/islands/api';
import { errorFields, errorText, worthRetrying } from '@/components/islands/query';

afterEach(() => vi.unstubAllGlobals());

const json = (data: unknown, status = 200) =>
  new Response(JSON.stringify(data), { status, headers: { 'content-type': 'application/json; charset=utf-8' } });

function answerWith(make: () => Response | Promise<Response>) {
  const fetch = vi.fn((_path: string, _init: RequestInit) => Promise.resolve(make()));
  vi.stubGlobal('fetch', fetch);
  return fetch;
}

const refused = () =>
  api('/api/x').then(
    () => expect.fail('The call went through.'),
    (error: unknown) => error as ApiError,
  );

describe('api', () => {
  it('reads with GET, and writes JSON with POST unless told otherwise', async () => {
    const fetch = answerWith(() => json({ id: 1 }));
    expect(await api('/api/cars')).toEqual({ id: 1 });
    await api('/api/cars', { body: { name: 'Car 1' } });
    await api('/api/cars/1', { method: 'PATCH', body: {} });
    expect(fetch.mock.calls.map(([, init]) => init.method)).toEqual(['GET', 'POST', 'PATCH']);
    expect(fetch.mock.calls[1]?.[1]).toMatchObject({
      body: '{"name":"Car 1"}',
      headers: { 'content-type': 'application/json' },
    });
  });

  it('leaves the content type of a form to the browser', async () => {
    const fetch = answerWith(() => json({}));
    const form = new FormData();
    await api('/api/passes/import', { body: form });
    expect(fetch.mock.calls[0]?.[1].body).toBe(form);
    expect(fetch.mock.calls[0]?.[1].headers).not.toHaveProperty('content-type');
  });

  it('turns a refusal into code, message and fields', async () => {
    const error = { code: 'VALIDATION', message: 'Too low.', fields: { pressurePa: 'Too low.' } };
    answerWith(() => json({ error }, 400));
    const thrown = await refused();
    expect(thrown).toBeInstanceOf(ApiError);
    expect(thrown).toMatchObject({ status: 400, ...error });
    expect([errorText(thrown), errorFields(thrown)]).toEqual(['Too low.', { pressurePa: 'Too low.' }]);
  });

  it('does not take the page of a captive portal for an answer', async () => {
    answerWith(() => new Response('<html>Welcome to the venue</html>', { headers: { 'content-type': 'text/html' } }));
    expect(await refused()).toMatchObject({ status: 200, code: 'NOT_OURS' });
  });

  it('says so when there is no connection', async () => {
    answerWith(() => Promise.reject(new TypeError('Failed to fetch')));
    expect(await refused()).toMatchObject({ status: 0, code: 'OFFLINE' });
  });
});

describe('trying again', () => {
  it('is for silence and for trouble of the server, never for a refusal, and not for ever', () => {
    const failed = (status: number) => new ApiError(status, 'X', 'x');
    expect([0, 500, 503].map((status) => worthRetrying(0, failed(status)))).toEqual([true, true, true]);
    expect([400, 403, 404, 409, 429].map((status) => worthRetrying(0, failed(status)))).toEqual(Array(5).fill(false));
    expect(worthRetrying(2, failed(0))).toBe(false);
  });

  it('shows our own words for an error it does not know', () => {
    expect(errorText(new Error('x is undefined'))).not.toContain('undefined');
    expect(errorFields(new Error('x'))).toEqual({});
  });
});
