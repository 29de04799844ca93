import { describe, expect, it } from 'vitest';
import { callerAddress } from '@/lib/server/auth/address';
import { isCommonPassword } from '@/lib/server/auth/common-passwords';
import { TryLimiter } from '@/lib/server/auth/limiter';
import { safeNext, signInPath } from '@/lib/server/auth/next-path';
import { limitParallel } from '@/lib/server/auth/parallel';

describe('safeNext', () => {
  it.each(['/cars', '/cars?x=1#top', '/a//b', '/%2f%2fevil.test'])('keeps %s', (path) => {
    expect(safeNext(path)).toBe(path);
  });

  it.each([
    'https://evil.test',
    '//evil.test',
    '/\\evil.test',
    '\\\\evil.test',
    '/\t/evil.test',
    '/\n/evil.test',
    '/.//evil.test',
    '/x/..//evil.test',
    'javascript:alert(1)',
    'cars',
    ' /cars',
    '',
    null,
    undefined,
  ])('goes to the start page instead of %j', (next) => {
    const path = safeNext(next);
    expect(path).toBe('/');
    expect(new URL(path, 'https://own.test').origin).toBe('https://own.test');
  });

  it('brings a reader back, and a post only to the sign-in page', () => {
    const url = new URL('http://own.test/cars?tab=2');
    expect(signInPath(url, 'GET')).toBe('/sign-in?next=%2Fcars%3Ftab%3D2');
    expect(signInPath(url, 'POST')).toBe('/sign-in');
    expect(signInPath(new URL('http://own.test//evil.test'), 'GET')).toBe('/sign-in');
  });
});

describe('common passwords', () => {
  it.each([
    'password1234',
    'PasswordPassword',
    '!!letmein2024!!',
    'adminadminadmin',
    'abcabcabcabc',
    '98765432109876',
    'qwertyuiop12',
    'dragracing2026',
    'zxcvbnm,./12',
  ])('knows %s', (password) => {
    expect(isCommonPassword(password)).toBe(true);
  });

  it.each(['lantern gravel orbit nine', 'xK4;fq2Lwz7&', 'the password is under the mat', 'summer flower hunter'])(
    'allows %s',
    (password) => {
      expect(isCommonPassword(password)).toBe(false);
    },
  );
});

describe('TryLimiter', () => {
  const rule = { free: 3, firstWaitS: 10, maxWaitS: 25 };

  it('doubles the wait up to the most, and forgets after a quiet half hour', () => {
    let now = 1_000_000;
    const limiter = new TryLimiter(() => now);
    const attempt = () => {
      try {
        limiter.begin(new Map([['key', rule]]));
        return 0;
      } catch (error) {
        return (error as { retryAfterS: number }).retryAfterS;
      }
    };
    expect([attempt(), attempt(), attempt(), attempt()]).toEqual([0, 0, 0, 10]);
    now += 10_000;
    expect([attempt(), attempt()]).toEqual([0, 20]);
    now += 20_000;
    expect([attempt(), attempt()]).toEqual([0, 25]);
    now += 30 * 60_000;
    expect([attempt(), attempt(), attempt(), attempt()]).toEqual([0, 0, 0, 10]);
  });

  it('does not lengthen the wait by tries during it', () => {
    let now = 0;
    const limiter = new TryLimiter(() => now);
    const begin = () => limiter.begin(new Map([['key', rule]]));
    for (let n = 0; n < 3; n += 1) begin();
    for (let n = 0; n < 50; n += 1) expect(begin).toThrow(/Wait/);
    now += 10_000;
    expect(begin).not.toThrow();
  });
});

describe('limitParallel', () => {
  it('runs so many at once, lets so many wait in order, and refuses more', async () => {
    const limited = limitParallel(2, 3, () => new Error('full'));
    const doors: (() => void)[] = [];
    const started: number[] = [];
    const task = (n: number) =>
      limited(
        () =>
          new Promise<number>((resolve) => {
            started.push(n);
            doors.push(() => resolve(n));
          }),
      );
    const all = [0, 1, 2, 3, 4].map(task);
    await expect(task(5)).rejects.toThrow('full');
    expect(started).toEqual([0, 1]);
    for (let n = 0; n < 5; n += 1) {
      doors[n]?.();
      expect(await all[n]).toBe(n);
      await Promise.resolve();
    }
    expect(started).toEqual([0, 1, 2, 3, 4]);
    const next = task(6);
    await Promise.resolve();
    doors[5]?.();
    await expect(next).resolves.toBe(6);
  });
});

describe('callerAddress', () => {
  const call = (headers: Record<string, string>) => ({
    request: new Request('http://own.test', { headers }),
    clientAddress: '192.0.2.1',
  });

  it('is the socket, or unknown beside a header anybody may send, unless a proxy is trusted', () => {
    expect(callerAddress(call({}), {})).toBe('192.0.2.1');
    expect(callerAddress(call({ 'x-forwarded-for': '192.0.2.1' }), {})).toBeNull();
    expect(callerAddress(call({ 'x-forwarded-for': '192.0.2.1' }), { TRUST_PROXY: '1' })).toBe('192.0.2.1');
  });
});
