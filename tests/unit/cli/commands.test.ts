import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, test } from 'vitest';

const SEASON = 'fixtures/passes/demo-season.csv';
const CONDITIONS = 'fixtures/passes/conditions.json';
const ADJUSTABLES = 'fixtures/passes/adjustables.json';
const folder = mkdtempSync(join(tmpdir(), 'slipband-commands-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function command(name: 'replay' | 'suggest', ...args: string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, ['--import', 'tsx', `src/cli/${name}.ts`, ...args], {
    encoding: 'utf8',
  });
  return { status, stdout, stderr };
}

function file(name: string, text: string): string {
  const path = join(folder, name);
  writeFileSync(path, text);
  return path;
}

const lines = readFileSync(SEASON, 'utf8').trim().split(/\r?\n/);
/** The header and the first n passes. */
const firstPasses = (n: number): string => file(`first-${n}.csv`, `${lines.slice(0, n + 1).join('\n')}\n`);

/** Bad input: exit 1, a message, no stack, nothing on stdout. */
function expectRefused(result: ReturnType<typeof command>, ...words: string[]) {
  expect(result.status).toBe(1);
  expect(result.stdout).toBe('');
  for (const word of words) expect(result.stderr).toContain(word);
  expect(result.stderr).not.toMatch(/\n\s+at |node:internal|Error:/);
}

describe('replay', () => {
  test('JSON has one entry per pass from the ninth on, with quantiles that rise', () => {
    const { status, stdout } = command('replay', firstPasses(30), '--json', '--suggest');
    expect(status).toBe(0);
    const { model, passes } = JSON.parse(stdout);
    expect(model).toBeTypeOf('string');
    expect(passes).toHaveLength(22);
    for (const p of passes) {
      if (p.refused) continue;
      const q = ['0.025', '0.1', '0.25', '0.5', '0.75', '0.9', '0.975'].map((k) => p.quantiles[k]);
      expect([...q].sort((a, b) => a - b)).toEqual(q);
      expect(p.p_in_band).toBeGreaterThanOrEqual(0);
      expect(p.p_in_band).toBeLessThanOrEqual(1);
      expect(Object.keys(p.suggestion.settings)).toHaveLength(5);
      expect(['offered', 'hold', 'too_few_passes', 'outside_experience']).toContain(p.suggestion.status);
    }
    expect(passes.filter((p: { refused: unknown }) => !p.refused).length).toBeGreaterThan(10);
  });
  test('the table is for people', () => {
    const { status, stdout } = command('replay', firstPasses(12), '--adjustables', ADJUSTABLES);
    expect(status).toBe(0);
    expect(stdout).toContain('80 % range');
  });
});

describe('suggest', () => {
  test('JSON of the interface: forecast, offers in steps and minutes, reasons', () => {
    const { status, stdout } = command(
      'suggest',
      SEASON,
      '--conditions',
      CONDITIONS,
      '--adjustables',
      ADJUSTABLES,
      '--json',
    );
    expect(status).toBe(0);
    const answer = JSON.parse(stdout);
    expect(answer.status).toBe('offered');
    expect(answer.no_change.p_below + answer.no_change.p_in_band + answer.no_change.p_above).toBeCloseTo(1, 3);
    expect(answer.offers.some((o: { changes: unknown[] }) => o.changes.length === 0)).toBe(true);
    const [change] = answer.offers[0].changes;
    expect(Object.keys(change).sort()).toEqual(['from', 'key', 'minutes', 'steps', 'to']);
    expect(answer.reasons.length).toBeGreaterThan(0);
  });
  test('too few passes is an answer, not an error', () => {
    const { status, stdout } = command('suggest', firstPasses(5), '--conditions', CONDITIONS, '--json');
    expect(status).toBe(0);
    expect(JSON.parse(stdout)).toMatchObject({ status: 'too_few_passes', no_change: null, offers: [] });
  });
  test('the text says it is not an instruction', () => {
    const { stdout } = command('suggest', SEASON, '--conditions', CONDITIONS);
    expect(stdout).toContain('not an instruction');
  });
});

describe('bad input is refused with a message that names it', () => {
  test('no file, a missing file, a folder, an unknown option', () => {
    expectRefused(command('replay'), 'Name a pass CSV file');
    expectRefused(command('replay', join(folder, 'none.csv')), 'no such file');
    expectRefused(command('replay', folder), 'folder');
    expectRefused(command('replay', SEASON, '--fast'), '--fast');
  });
  test('an empty file, a picture, missing columns', () => {
    expectRefused(command('replay', file('empty.csv', '')));
    expectRefused(command('replay', file('picture.csv', '\u0089PNG\r\n\u001a\n\u0000\u0000')));
    expectRefused(command('replay', file('columns.csv', 'a,b,c\n1,2,3\n')));
  });
  test('a bad row names its row, column and reason, and can be left out on purpose', () => {
    const column = lines[0]!.split(',').indexOf('track_temp_f');
    const bad = lines.slice(0, 12).map((line, i) =>
      i === 11
        ? line
            .split(',')
            .map((v, j) => (j === column ? 'warm' : v))
            .join(',')
        : line,
    );
    const path = file('bad-row.csv', `${bad.join('\n')}\n`);
    expectRefused(command('replay', path), 'row 12', 'track_temp_f');
    expect(command('replay', path, '--skip-refused').status).toBe(0);
  });
  test('conditions that lack a setting, a time, or sense', () => {
    const good = JSON.parse(readFileSync(CONDITIONS, 'utf8'));
    const asked = (change: object) =>
      command('suggest', SEASON, '--conditions', file('c.json', JSON.stringify({ ...good, ...change })));
    expectRefused(command('suggest', SEASON), '--conditions');
    expectRefused(command('suggest', SEASON, '--conditions', file('broken.json', '{')), 'not valid JSON');
    expectRefused(asked({ current: { ...good.current, counterweight_g: 'heavy' } }), 'counterweight_g');
    expectRefused(asked({ date_time: '' }), 'date_time');
    expectRefused(asked({ track_temp_f: 900 }), 'track_temp_f');
    expectRefused(asked({ minutes_left: -4 }), 'minutes_left');
  });
  test('adjustables that make no sense', () => {
    const path = file('adjustables.json', JSON.stringify([{ key: 'counterweight_g', step: 0 }]));
    expectRefused(command('replay', SEASON, '--adjustables', path), 'counterweight_g');
  });
});
