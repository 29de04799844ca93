/** `npm test`: every check in order, all of them whatever fails; the last line is the sum. */
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { countExit, countLine, countPlaywright, countRun, countVitest, sumCounts } from './lib-count.mjs';
import { ensureInstalled } from './lib-install.mjs';
import { childEnv, endWithNpm, ROOT, run } from './lib-process.mjs';

const MINUTE_MS = 60_000;

/** @typedef {{ name: string, args: string[], minutes: number, env?: Record<string, string>, count(code: number): import('./lib-count.mjs').Count }} Step */

endWithNpm();
await ensureInstalled();
const reports = mkdtempSync(join(tmpdir(), 'slipband-reports-'));
const vitestReport = join(reports, 'vitest.json');
const playwrightReport = join(reports, 'playwright.json');

/** @type {Step[]} */
const STEPS = [
  { name: 'biome', args: [bin('@biomejs/biome/bin/biome'), 'check', '.'], minutes: 1, count: countExit },
  { name: 'astro check', args: [bin('astro/astro.js'), 'check'], minutes: 4, count: countExit },
  {
    name: 'vitest',
    args: [
      bin('vitest/vitest.mjs'),
      'run',
      '--reporter=default',
      '--reporter=json',
      `--outputFile.json=${vitestReport}`,
    ],
    minutes: 6,
    count: (code) => countRun(countReport(vitestReport, countVitest), code),
  },
  {
    name: 'playwright',
    args: [bin('@playwright/test/cli.js'), 'test', '--reporter=list,json'],
    minutes: 8,
    env: { PLAYWRIGHT_JSON_OUTPUT_FILE: playwrightReport },
    count: (code) => countRun(countReport(playwrightReport, countPlaywright), code),
  },
];

const results = [];
for (const step of STEPS) results.push(await runStep(step));
rmSync(reports, { recursive: true, force: true });

const total = sumCounts(results.map((result) => result.count));
console.log('\nSteps:');
for (const { name, count, note } of results) console.log(`  ${name.padEnd(12)} ${countLine(count)}${note}`);
console.log(countLine(total));
process.exitCode = total.failed > 0 || total.passed === 0 ? 1 : 0;

async function runStep(/** @type {Step} */ { name, args, minutes, env, count }) {
  console.log(`\n=== ${name}`);
  const startedAt = Date.now();
  const timeoutMs = minutes * MINUTE_MS;
  const { code, timedOut } = await run(process.execPath, args, { env: childEnv(env), timeoutMs });
  const seconds = Math.round((Date.now() - startedAt) / 1000);
  const note = timedOut ? ` (stopped after ${minutes} minutes)` : ` (${seconds} s)`;
  return { name, note, count: timedOut ? countRun(count(1), 1) : count(code) };
}

function bin(/** @type {string} */ path) {
  return join(ROOT, 'node_modules', path);
}

/** @returns {import('./lib-count.mjs').Count | null} */
function countReport(
  /** @type {string} */ path,
  /** @type {(report: any) => import('./lib-count.mjs').Count} */ counter,
) {
  try {
    return counter(JSON.parse(readFileSync(path, 'utf8')));
  } catch {
    return null;
  }
}
