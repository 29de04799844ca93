import { createServer, type Server } from 'node:net';
import { afterEach, describe, expect, it } from 'vitest';
import { isAlive } from '../../../src/cli/lib-process.mjs';
import { notePath } from '../../../src/cli/lib-running.mjs';
import { callableHost, isPortFree, parsePort, pickPort } from '../../../src/cli/lib-server.mjs';

const taken = (...ports: number[]) => ({ first: 4321, isFree: async (port: number) => !ports.includes(port) });

describe('pickPort', () => {
  it('takes the default, or the next free one when nobody asked for a port', async () => {
    expect(await pickPort({ asked: null, ...taken() })).toBe(4321);
    expect(await pickPort({ asked: null, ...taken(4321, 4322) })).toBe(4323);
  });

  it('never swaps a port that was asked for', async () => {
    expect(await pickPort({ asked: 5000, ...taken(4321) })).toBe(5000);
    expect(await pickPort({ asked: 5000, ...taken(5000) })).toBeNull();
  });

  it('gives up after a while', async () => {
    expect(await pickPort({ asked: null, first: 4321, isFree: async () => false })).toBeNull();
  });
});

describe('isPortFree', () => {
  let server: Server;
  afterEach(() => new Promise((resolve) => server.close(resolve)));

  it('says no while another program listens', async () => {
    server = createServer();
    const port = await new Promise<number>((resolve) =>
      server.listen(0, '127.0.0.1', () => resolve((server.address() as { port: number }).port)),
    );
    expect(await isPortFree(port, '127.0.0.1')).toBe(false);
    await new Promise((resolve) => server.close(resolve));
    expect(await isPortFree(port, '127.0.0.1')).toBe(true);
  });
});

describe('settings', () => {
  it('reads PORT', () => {
    expect(parsePort(undefined)).toEqual({ port: null });
    expect(parsePort('')).toEqual({ port: null });
    expect(parsePort('4400')).toEqual({ port: 4400 });
    for (const text of ['0', '65536', '44.5', 'http', '-1'])
      expect(parsePort(text)).toEqual({ problem: expect.stringContaining(`"${text}"`) });
  });

  it('calls every-interface addresses by loopback', () => {
    const hosts = ['0.0.0.0', '127.0.0.1', '::', '::1', 'fd00::2', 'pit.local'];
    expect(hosts.map(callableHost)).toEqual(['127.0.0.1', '127.0.0.1', '[::1]', '[::1]', '[fd00::2]', 'pit.local']);
  });
});

describe('the note of a running server', () => {
  it('lies beside a local database only', () => {
    expect(notePath('file:/tmp/x.db')).toBe('/tmp/x.db.server.json');
    expect(notePath('file:///tmp/x.db')).toBe('/tmp/x.db.server.json');
    expect(notePath('file:data/slipband.db')).toMatch(/^\/.*\/data\/slipband\.db\.server\.json$/);
    expect(notePath('libsql://db.example')).toBeNull();
  });

  it('counts only while its process lives', () => {
    expect(isAlive(process.pid)).toBe(true);
    for (const pid of [0, -1, Number.NaN, 2 ** 30]) expect(isAlive(pid)).toBe(false);
  });
});
