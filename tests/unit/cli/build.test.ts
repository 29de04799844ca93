import { mkdirSync, mkdtempSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { hashInputs } from '../../../src/cli/lib-build.mjs';

let root = '';

beforeEach(() => {
  root = mkdtempSync(join(tmpdir(), 'slipband-hash-'));
  mkdirSync(join(root, 'src/cli'), { recursive: true });
  writeFileSync(join(root, 'src/one.ts'), 'one');
  writeFileSync(join(root, 'src/cli/tool.ts'), 'tool');
  writeFileSync(join(root, 'config.mjs'), 'config');
});
afterEach(() => rmSync(root, { recursive: true, force: true }));

const hash = () => hashInputs(root, ['src', 'config.mjs', 'absent'], ['src/cli']);

describe('hashInputs', () => {
  it('stays the same when nothing, or only something left out, changed', () => {
    const before = hash();
    writeFileSync(join(root, 'src/cli/tool.ts'), 'changed');
    writeFileSync(join(root, 'notes.md'), 'not an input');
    expect(hash()).toBe(before);
  });

  it('does not depend on the order of the inputs', () => {
    expect(hashInputs(root, ['config.mjs', 'src'])).toBe(hashInputs(root, ['src', 'config.mjs']));
  });

  it.each([
    ['an edit', () => writeFileSync(join(root, 'src/one.ts'), 'two')],
    ['a new file', () => writeFileSync(join(root, 'src/new.ts'), '')],
    ['a renamed file', () => renameSync(join(root, 'src/one.ts'), join(root, 'src/two.ts'))],
    ['a removed file', () => rmSync(join(root, 'config.mjs'))],
  ])('changes with %s', (_what, change) => {
    const before = hash();
    change();
    expect(hash()).not.toBe(before);
  });
});
