import { describe, expect, it } from 'vitest';
import {
  countExit,
  countLine,
  countPlaywright,
  countRun,
  countVitest,
  sumCounts,
} from '../../../src/cli/lib-count.mjs';

const NOTHING = { passed: 0, failed: 0, skipped: 0 };
const vitestReport = { numPassedTests: 7, numFailedTests: 1, numPendingTests: 2, numTodoTests: 1 };

describe('counting', () => {
  it('counts a step without tests as one', () => {
    expect([countExit(0), countExit(2)]).toEqual([
      { ...NOTHING, passed: 1 },
      { ...NOTHING, failed: 1 },
    ]);
  });

  it('counts a vitest file that could not be loaded as a failure', () => {
    const testResults = [
      { status: 'failed', assertionResults: [{}] },
      { status: 'failed', assertionResults: [] },
      { status: 'passed', assertionResults: [{}] },
    ];
    expect(countVitest({ ...vitestReport, testResults })).toEqual({ passed: 7, failed: 2, skipped: 3 });
  });

  it('counts a flaky browser test as a failure', () => {
    const stats = { expected: 5, unexpected: 1, flaky: 2, skipped: 3 };
    expect(countPlaywright({ stats })).toEqual({ passed: 5, failed: 3, skipped: 3 });
  });

  it('finds at least one failure in a run that ended badly, left no report or ran nothing', () => {
    const good = { passed: 3, failed: 0, skipped: 0 };
    expect(countRun(good, 1)).toEqual({ ...good, failed: 1 });
    expect(countRun(null, 0)).toEqual({ ...NOTHING, failed: 1 });
    expect(countRun({ ...NOTHING, skipped: 4 }, 0)).toEqual({ passed: 0, failed: 1, skipped: 4 });
  });

  it('adds nothing to a run whose failures are counted, or that went well', () => {
    const bad = { passed: 3, failed: 2, skipped: 0 };
    expect(countRun(bad, 1)).toEqual(bad);
    expect(countRun({ ...bad, failed: 0 }, 0)).toEqual({ ...bad, failed: 0 });
  });

  it('sums and says it in the one line', () => {
    const total = sumCounts([
      { passed: 10, failed: 1, skipped: 0 },
      { passed: 5, failed: 0, skipped: 2 },
    ]);
    expect(countLine(total)).toBe('15 passed, 1 failed, 2 skipped');
    expect(countLine({ ...total, skipped: 0 })).toBe('15 passed, 1 failed');
    expect(sumCounts([])).toEqual(NOTHING);
  });
});
