/** npm run --silent replay -- FILE.csv [--json] [--suggest] [--adjustables FILE.json] [--skip-refused] */
import { MODEL_VERSION } from '@/lib/domain/model';
import { type ReplayEntry, replaySeason } from '@/lib/domain/season/replay';
import { DEFAULT_BAND } from '@/lib/domain/types';
import { toPassRecord } from '@/lib/pass-csv';
import { forecastJson, percent, readAdjustables, readArguments, readPassFile, runCommand } from './lib-command';

const HELP = `Runs a season again one pass at a time: each pass is forecast from the passes before it only.

  npm run --silent replay -- FILE.csv [--json] [--suggest] [--adjustables FILE.json] [--skip-refused]

  --json          one JSON object instead of a table
  --suggest       also what would have been offered first, from the settings of the pass before
  --adjustables   the car's adjustables (JSON); without it, five defaults
  --skip-refused  go on without rows that cannot be read`;

function entryJson(e: ReplayEntry) {
  const forecast = e.forecast ? forecastJson(e.forecast) : null;
  return {
    pass_no: e.passNo,
    n_train: e.passesUsed,
    mean: forecast?.mean ?? null,
    sd: forecast?.sd ?? null,
    quantiles: forecast?.quantiles ?? null,
    p_below: forecast?.p_below ?? null,
    p_in_band: forecast?.p_in_band ?? null,
    p_above: forecast?.p_above ?? null,
    outside_experience: e.outsideExperience,
    refused: e.refused,
    ...(e.suggestion
      ? {
          suggestion: {
            status: e.suggestion.status === 'missing_input' ? 'hold' : e.suggestion.status,
            settings: e.suggestion.settings,
            p_in_band: e.suggestion.pInBand,
            leverage: Number(e.suggestion.leverage.toFixed(4)),
          },
        }
      : {}),
  };
}

function table(entries: readonly ReplayEntry[]): string {
  const header = 'pass   seen   forecast  80 % range       in band  measured';
  const lines = entries.map((e) => {
    const f = e.forecast;
    const measured = e.slipPct === null ? '-' : e.slipPct.toFixed(1);
    if (!f) return `${String(e.passNo).padEnd(6)} ${String(e.passesUsed).padEnd(6)} too few passes`;
    const range = `${f.quantiles['0.1']!.toFixed(1)}-${f.quantiles['0.9']!.toFixed(1)} %`;
    const mark = e.outsideExperience ? '  outside experience' : '';
    return `${String(e.passNo).padEnd(6)} ${String(e.passesUsed).padEnd(6)} ${`${f.quantiles['0.5']!.toFixed(1)} %`.padEnd(9)} ${range.padEnd(16)} ${percent(f.pInBand).padEnd(8)} ${measured}${mark}`;
  });
  return [header, ...lines].join('\n');
}

await runCommand(HELP, async (argv) => {
  const args = readArguments(argv, ['--json', '--suggest', '--skip-refused'], ['--adjustables']);
  const adjustables = await readAdjustables(args);
  const rows = await readPassFile(args, adjustables);
  const entries = replaySeason(rows.map(toPassRecord), {
    adjustables,
    band: DEFAULT_BAND,
    suggest: args.flags.has('--suggest'),
  });
  const text = args.flags.has('--json')
    ? JSON.stringify({ model: MODEL_VERSION, passes: entries.map(entryJson) })
    : table(entries);
  process.stdout.write(`${text}\n`);
});
