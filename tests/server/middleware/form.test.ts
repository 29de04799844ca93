import { beforeEach, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { type FormPage, handleForm, handleOpenForm } from '@/lib/server/form';
import { createTrack, listTracks } from '@/lib/server/tracks';
import { contextFor, fakeCall, makeTestDb, type World } from '../helpers';

let world: World;
beforeEach(async () => {
  world = await makeTestDb();
});

const page = (body?: BodyInit, role: 'tuner' | 'driver' = 'tuner') =>
  fakeCall({ as: contextFor(world, role), method: body ? 'POST' : 'GET', body }) as unknown as FormPage;
const fields = (values: Record<string, string>) => new URLSearchParams(values);
const trackForm = { run: createTrack, done: (track: { id: string }) => `/tracks/${track.id}` };

describe('handleForm', () => {
  it('shows what the inputs start with before anything is sent', async () => {
    const state = await handleForm(page(), {
      ...trackForm,
      initial: { timeZone: 'America/Denver', altitudeM: 1770.5, name: null },
    });
    expect(state).toEqual({
      response: null,
      values: { timeZone: 'America/Denver', altitudeM: '1770.5', name: '' },
      errors: {},
      message: null,
    });
  });

  it('runs the verb and goes on with 303', async () => {
    const { response } = await handleForm(
      page(fields({ name: 'Mesa', timeZone: 'America/Denver', altitudeFt: '5 800'.replace(' ', '') })),
      trackForm,
    );
    const [made] = await listTracks(contextFor(world, 'driver'));
    expect(response?.status).toBe(303);
    expect(response?.headers.get('location')).toBe(`/tracks/${made?.id}`);
  });

  it('keeps what was typed and names each field that is wrong', async () => {
    const typed = { name: '', timeZone: 'Nowhere', altitudeM: '12,5' };
    const target = page(fields(typed));
    const state = await handleForm(target, trackForm);
    expect(state).toMatchObject({ response: null, values: typed });
    expect(Object.keys(state.errors).sort()).toEqual(['name', 'timeZone']);
    expect(state.message).toBe(state.errors.name);
    expect(target.response.status).toBe(400);
    expect(await listTracks(contextFor(world, 'driver'))).toEqual([]);
  });

  it('says when the role does not allow it', async () => {
    const target = page(fields({ name: 'Mesa' }), 'driver');
    expect((await handleForm(target, trackForm)).message).toContain('role');
    expect(target.response.status).toBe(403);
  });

  it('hides an unexpected error and keeps what was typed', async () => {
    const logged = vi.spyOn(console, 'error').mockImplementation(() => undefined);
    const target = page(fields({ name: 'Mesa' }));
    const failing = { ...trackForm, run: () => Promise.reject(new Error('SELECT secret FROM table')) };
    const state = await handleForm(target, failing);
    expect(state.values).toEqual({ name: 'Mesa' });
    expect(state.message).toContain(target.locals.requestId);
    expect(state.message).not.toContain('SELECT');
    expect(target.response.status).toBe(500);
    expect(logged).toHaveBeenCalledOnce();
    logged.mockRestore();
  });
});

describe('what the verb gets', () => {
  const rawOf = async (body: BodyInit) => {
    let seen: unknown;
    const run = async (raw: unknown) => {
      seen = raw;
    };
    const state = await handleOpenForm(page(body), { run, done: () => '/' });
    return { seen, state };
  };

  it('nests dotted names, keeps the last of a repeated name, and drops names that reach into objects', async () => {
    const body = new URLSearchParams([
      ['settings.launch_rpm', '7000'],
      ['settings.lever', '3'],
      ['movable', 'false'],
      ['movable', 'true'],
      ['__proto__.polluted', 'yes'],
      ['settings.__proto__', 'yes'],
    ]);
    const { seen, state } = await rawOf(body);
    expect(seen).toEqual({ settings: { launch_rpm: '7000', lever: '3' }, movable: 'true' });
    expect(({} as Record<string, unknown>).polluted).toBeUndefined();
    expect(state.values['settings.launch_rpm']).toBe('7000');
  });

  it('gives files as files and refills neither them nor passwords', async () => {
    const body = new FormData();
    body.set('password', 'lantern gravel');
    body.set('newPassword', 'lantern gravel');
    body.set('file', new File(['a,b'], '../../etc/x.csv'));
    body.set('note', 'kept');
    const { seen, state } = await rawOf(body);
    expect((seen as { file: File }).file).toBeInstanceOf(File);
    expect(state.values).toEqual({ note: 'kept' });
  });

  it('puts the error of a nested field under its dotted name', async () => {
    const schema = z.object({ settings: z.object({ rpm: z.string().max(2, 'Too long.') }) });
    const run = async (raw: unknown) => schema.parse(raw);
    const state = await handleOpenForm(page(fields({ 'settings.rpm': '7000' })), { run, done: () => '/' });
    expect(state.errors).toEqual({ 'settings.rpm': 'Too long.' });
  });

  it('refuses a body over the limit and one that is no form', async () => {
    const run = vi.fn(async () => undefined);
    const large = page(fields({ note: 'x'.repeat(70_000) }));
    await handleOpenForm(large, { run, done: () => '/' });
    expect(large.response.status).toBe(413);
    const text = page('{"a":1}');
    const state = await handleOpenForm(text, { run, done: () => '/' });
    expect(text.response.status).toBe(400);
    expect(state.message).toContain('could not be read');
    expect(run).not.toHaveBeenCalled();
  });

  it('runs only the form that was sent when a page holds several', async () => {
    const target = page(fields({ _form: 'second', name: 'Mesa' }));
    const [first, second] = [vi.fn(async () => 1), vi.fn(async (_raw: unknown) => 2)];
    const untouched = await handleOpenForm(target, {
      name: 'first',
      run: first,
      done: () => '/first',
      initial: { name: 'as it is' },
    });
    const sent = await handleOpenForm(target, { name: 'second', run: second, done: () => '/second' });
    expect(untouched).toMatchObject({ response: null, values: { name: 'as it is' } });
    expect(sent.response?.headers.get('location')).toBe('/second');
    expect(first).not.toHaveBeenCalled();
    expect(second).toHaveBeenCalledWith({ name: 'Mesa' });
  });
});
