/** npm run --silent suggest -- FILE.csv --conditions FILE.json [--json] [--adjustables FILE.json] [--skip-refused] */
import { suggestFor } from '@/lib/domain/model';
import { type Adjustable, DEFAULT_BAND, type Offer, type Suggestion } from '@/lib/domain/types';
import { toPassRecord } from '@/lib/pass-csv';
import {
  CommandError,
  forecastJson,
  percent,
  readAdjustables,
  readArguments,
  readJsonFile,
  readPassFile,
  runCommand,
} from './lib-command';
import { readRunRequest } from './lib-conditions';

const HELP = `What the team's own passes suggest for one run: a statistical suggestion, not an instruction.

  npm run --silent suggest -- FILE.csv --conditions FILE.json [--json] [--adjustables FILE.json] [--skip-refused]

  --conditions    the run: event, track, date_time, round, lane, runs_on_discs, the condition columns of a pass file,
                  "current": {adjustable: value}, and optionally "minutes_left"
  --json          JSON instead of text
  --adjustables   the car's adjustables (JSON); without it, five defaults
  --skip-refused  go on without rows that cannot be read`;

const offerJson = (o: Offer) => ({ settings: o.settings, changes: o.changes, forecast: forecastJson(o.forecast) });

function suggestionJson(s: Suggestion) {
  return {
    status: s.status === 'missing_input' ? 'hold' : s.status,
    no_change: s.noChange ? forecastJson(s.noChange) : null,
    offers: s.offers.map(offerJson),
    warnings: s.warnings,
    reasons: s.reasons,
    passes_used: s.passesUsed,
    model: s.modelVersion,
  };
}

function suggestionText(s: Suggestion, adjustables: readonly Adjustable[]): string {
  const lines = [
    `${s.passesUsed} passes used. Band ${s.band.lowPct}-${s.band.highPct} % slip (a rule of thumb).`,
    ...s.reasons,
  ];
  if (s.noChange) lines.push(`As it stands: ${oddsText(s.noChange)}`);
  for (const offer of s.offers.filter((o) => o.changes.length > 0))
    lines.push(`${changesText(offer, adjustables)}: ${oddsText(offer.forecast)}`);
  return [
    ...lines,
    ...s.warnings,
    'A statistical suggestion from past passes, not an instruction: the crew chief decides.',
  ].join('\n');
}

function changesText(offer: Offer, adjustables: readonly Adjustable[]): string {
  return offer.changes
    .map((c) => {
      const a = adjustables.find((x) => x.key === c.key);
      return `${a?.label ?? c.key} ${c.from} -> ${c.to} ${a?.unit ?? ''} (${c.steps > 0 ? '+' : ''}${c.steps} steps, ${c.minutes} min)`;
    })
    .join(', ');
}

function oddsText(f: NonNullable<Suggestion['noChange']>): string {
  const range = `${f.quantiles['0.1']!.toFixed(1)}-${f.quantiles['0.9']!.toFixed(1)} %`;
  return `middle ${f.quantiles['0.5']!.toFixed(1)} %, 80 % range ${range}; below ${percent(f.pBelow)}, in the band ${percent(f.pInBand)}, above ${percent(f.pAbove)}`;
}

await runCommand(HELP, async (argv) => {
  const args = readArguments(argv, ['--json', '--skip-refused'], ['--adjustables', '--conditions']);
  const conditions = args.values.get('--conditions');
  if (!conditions)
    throw new CommandError('Name the conditions file with --conditions FILE.json. --help says what it holds.');
  const adjustables = await readAdjustables(args);
  const rows = await readPassFile(args, adjustables);
  const request = readRunRequest(await readJsonFile(conditions), adjustables);
  const suggestion = suggestFor({ passes: rows.map(toPassRecord), adjustables, band: DEFAULT_BAND, ...request });
  const text = args.flags.has('--json')
    ? JSON.stringify(suggestionJson(suggestion))
    : suggestionText(suggestion, adjustables);
  process.stdout.write(`${text}\n`);
});
