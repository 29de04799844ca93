import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { demoFiles, demoPassRows, generateDemoSeason } from '@/demo';
import { DEFAULT_ADJUSTABLES, parseAdjustables } from '@/lib/domain/default-adjustables';
import { parsePassCsv } from '@/lib/pass-csv';

const season = generateDemoSeason();
const files = demoFiles(season);
const committed = (name: string): string =>
  readFileSync(fileURLToPath(new URL(`../../../fixtures/passes/${name}`, import.meta.url)), 'utf8');

describe('the committed example files', () => {
  it('are the four the generator makes', () => {
    expect(Object.keys(files)).toEqual(['demo-season.csv', 'sample-small.csv', 'conditions.json', 'adjustables.json']);
  });

  it.each(Object.entries(files))(
    '%s is as the generator makes it (npx tsx src/demo/write-fixtures.ts)',
    (name, content) => {
      expect(committed(name)).toBe(content);
    },
  );

  it('hold every pass of the season, and nothing that is refused or unknown', () => {
    const parsed = parsePassCsv(committed('demo-season.csv'), DEFAULT_ADJUSTABLES);
    expect(parsed).toMatchObject({ refused: [], unknownColumns: [], missingColumns: [], fileError: null });
    expect(parsed.rows.map(({ rowNumber: _, ...row }) => row)).toEqual(demoPassRows(season));
    expect(parsePassCsv(committed('sample-small.csv'), DEFAULT_ADJUSTABLES).rows).toHaveLength(24);
  });

  it('name the round the demo waits for, in the columns of a pass file', () => {
    const conditions = JSON.parse(committed('conditions.json'));
    expect(conditions).toMatchObject({ current: season.next.current, runs_on_discs: season.next.runsOnDiscs });
    expect(Date.parse(conditions.date_time)).toBe(Date.parse(season.next.at));
    expect(season.events.at(-1)!.name).toBe(conditions.event);
  });

  it('hold the default adjustables', () => {
    expect(parseAdjustables(JSON.parse(committed('adjustables.json')))).toEqual(DEFAULT_ADJUSTABLES);
  });
});
