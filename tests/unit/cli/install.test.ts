import { describe, expect, it } from 'vitest';
import { lockMatches, nodeProblem } from '../../../src/cli/lib-install.mjs';

describe('nodeProblem', () => {
  it.each(['20.19.0', '20.20.2', '21.0.0', '22.1.0', '100.0.0'])('accepts %s', (version) => {
    expect(nodeProblem(version)).toBeNull();
  });

  it.each(['18.20.4', '20.18.9', '9.99.0'])('refuses %s and names the version needed', (version) => {
    expect(nodeProblem(version)).toContain('Node 20.19 or newer');
    expect(nodeProblem(version)).toContain(version);
  });
});

describe('lockMatches', () => {
  const a = { version: '1.0.0', integrity: 'sha512-a' };
  const forOtherMachines = { version: '2.0.0', integrity: 'sha512-b', optional: true };
  const lock = { packages: { '': { version: '0.1.0' }, 'node_modules/a': a, 'node_modules/b': forOtherMachines } };

  it('accepts the same packages, with optional ones absent', () => {
    expect(lockMatches(lock, { packages: { 'node_modules/a': a } })).toBe(true);
  });

  it('sees a package that is missing, of another version, of other content, or no longer asked for', () => {
    const trees: Record<string, typeof a>[] = [
      { 'node_modules/b': forOtherMachines },
      { 'node_modules/a': { ...a, version: '1.0.1' } },
      { 'node_modules/a': { ...a, integrity: 'sha512-other' } },
      { 'node_modules/a': a, 'node_modules/left-over': a },
    ];
    expect(trees.map((packages) => lockMatches(lock, { packages }))).toEqual([false, false, false, false]);
  });

  it('sees a wrong version of an optional package that is there', () => {
    const packages = { 'node_modules/a': a, 'node_modules/b': { ...forOtherMachines, version: '2.0.1' } };
    expect(lockMatches(lock, { packages })).toBe(false);
  });
});
