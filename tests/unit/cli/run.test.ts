import { spawnSync } from 'node:child_process';
import { describe, expect, it } from 'vitest';
import { ROOT } from '../../../src/cli/lib-process.mjs';

const runCommand = (...args: string[]) =>
  spawnSync(process.execPath, ['src/cli/run.mjs', ...args], { cwd: ROOT, encoding: 'utf8' });

describe('run.mjs', () => {
  it.each([['nope'], ['../db/seed'], ['start']])('refuses "%s" on stderr and names the commands', (name) => {
    const { status, stdout, stderr } = runCommand(name);
    expect({ status, stdout }).toEqual({ status: 1, stdout: '' });
    expect(stderr).toContain('replay, suggest, bench');
    expect(stderr).not.toContain('    at ');
  });
});
