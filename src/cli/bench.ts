/** npm run --silent bench -- [--json]: what the main jobs cost on this machine, as ratios where a ratio holds. */
import { GENERATORS, simulateSeason } from '@/evaluate/generators';
import { suggestWith } from '@/lib/domain/model';
import { leastSquares } from '@/lib/domain/model/least-squares';
import { searchSettings } from '@/lib/domain/model/search';
import { preparePasses, trainModel } from '@/lib/domain/model/train';
import { replaySeason } from '@/lib/domain/season/replay';
import { DEFAULT_BAND } from '@/lib/domain/types';
import { type Figure, figuresTable, medianMs } from './lib-bench';
import { benchImport } from './lib-bench-import';
import { benchScripts } from './lib-bench-scripts';
import { readArguments, runCommand } from './lib-command';

const HELP = `Times the main jobs on this machine.

  npm run --silent bench -- [--json]`;

const BASE = { ...GENERATORS[1]!, events: 50, passesPerEvent: 10 };

/** A season of n passes whose model has 26 columns: 11 adjustables, conditions, discs, lane, round and three tracks. */
function seasonOf(n: number) {
  const options = { ...BASE, name: 'bench', extraAdjustables: 6, tracks: 3, events: Math.ceil(n / 10) };
  const season = simulateSeason(options, 1);
  return { ...season, passes: season.passes.slice(0, n) };
}

function benchModel(): Figure[] {
  const season = seasonOf(500);
  const prepared = preparePasses(season.passes);
  const fitSeason = () => trainModel(prepared, season.adjustables, DEFAULT_BAND)!;
  const model = fitSeason();
  const { design, y } = model.input;
  const rows = Array.from({ length: design.n }, (_, i) => [...design.x.subarray(i * design.p, (i + 1) * design.p)]);
  const run = prepared[prepared.length - 1]!.features;
  const fitMs = medianMs(fitSeason, 21);
  const plainMs = medianMs(() => leastSquares(rows, [...y]), 21);
  const searchMs = medianMs(() => searchSettings(model, run, null), 21);
  const context = season.passes[season.passes.length - 1]!;
  const input = {
    passes: [],
    adjustables: season.adjustables,
    band: DEFAULT_BAND,
    context,
    current: context.settings,
    minutesLeft: null,
  };
  const wholeMs = medianMs(() => suggestWith(model, prepared, input), 21);
  return [
    {
      name: `fit, 500 passes x ${design.p} columns`,
      value: fitMs,
      unit: 'ms',
      goal: 50,
      note: 'median of 21; includes reweighting and recalibration',
    },
    {
      name: 'fit over one plain least squares of the same rows',
      value: fitMs / plainMs,
      unit: 'x',
      goal: null,
      note: `plain: ${plainMs.toFixed(1)} ms`,
    },
    { name: 'suggestion search, 11 adjustables, pairs', value: searchMs, unit: 'ms', goal: 20, note: 'median of 21' },
    {
      name: 'whole suggestion on a kept fit',
      value: wholeMs,
      unit: 'ms',
      goal: null,
      note: 'search, explanation, forecasts',
    },
  ];
}

function benchGrowth(): Figure[] {
  const perPass = [50, 500, 5000].map((n) => {
    const season = seasonOf(n);
    const prepared = preparePasses(season.passes);
    return medianMs(() => trainModel(prepared, season.adjustables, DEFAULT_BAND), 5, 1) / n;
  });
  const [small, middle, large] = perPass.map((ms) => ms / perPass[1]!);
  const note = 'of the cost per pass at 500; 1 is linear';
  return [
    { name: 'cost per pass at 50 passes', value: small!, unit: 'x', goal: null, note },
    { name: 'cost per pass at 5 000 passes', value: large! / middle!, unit: 'x', goal: 1.2, note },
  ];
}

function benchReplay(): Figure[] {
  const season = simulateSeason({ ...BASE, events: 17, passesPerEvent: 10, name: 'bench-replay' }, 1);
  const options = { adjustables: season.adjustables, band: DEFAULT_BAND };
  const plain = medianMs(() => replaySeason(season.passes, options), 1, 0);
  const withSuggestions = medianMs(() => replaySeason(season.passes, { ...options, suggest: true }), 1, 0);
  return [
    { name: 'replay of 170 passes', value: plain / 1000, unit: 's', goal: 10, note: '' },
    { name: 'replay of 170 passes with suggestions', value: withSuggestions / 1000, unit: 's', goal: null, note: '' },
  ];
}

await runCommand(HELP, async (argv) => {
  const args = readArguments(argv, ['--json'], []);
  const figures = [
    ...benchModel(),
    ...benchGrowth(),
    ...benchReplay(),
    ...(await benchImport()),
    ...(await benchScripts()),
  ];
  process.stdout.write(`${args.flags.has('--json') ? JSON.stringify(figures) : figuresTable(figures)}\n`);
});
