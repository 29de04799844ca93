/** npm run evaluate -- [--generators a,b] [--seeds N] [--json]: replays simulated seasons with known truth and prints the table. */
import { GENERATORS, simulateSeason } from '@/evaluate/generators';
import { type PassScore, scoreSeason } from '@/evaluate/season-score';
import { readArguments, runCommand } from './lib-command';

const HELP = `Measures the model on simulated seasons with known truth, one step ahead.

  npm run evaluate -- [--generators name,name] [--seeds N] [--json]`;

const DEFAULT_SEEDS = 20;

const mean = (values: readonly number[]): number => values.reduce((s, v) => s + v, 0) / Math.max(1, values.length);
const sd = (values: readonly number[]): number => Math.sqrt(mean(values.map((v) => v * v)) - mean(values) ** 2);
/** Standard error over seasons of a per-season mean. */
const seOver = (seasons: readonly PassScore[][], f: (p: PassScore) => number | null): number => {
  const means = seasons.map((s) => mean(s.map(f).filter((v) => v !== null)));
  return sd(means) / Math.sqrt(Math.max(1, means.length - 1));
};

const BUCKETS: readonly [string, number, number][] = [
  ['8-13', 8, 14],
  ['14-29', 14, 30],
  ['30-59', 30, 60],
  ['60-99', 60, 100],
  ['100+', 100, Number.POSITIVE_INFINITY],
];

const within = (level: number) => (p: PassScore) => Number(Math.abs(p.pit - 0.5) < level / 2);

function summarise(seasons: readonly PassScore[][]) {
  const all = seasons.flat();
  const far = all.flatMap((p) => p.far);
  const odds = all.map((p) => p.odds).filter((o) => o !== null);
  const m = (f: (p: PassScore) => number) => mean(all.map(f));
  return {
    passes: all.length,
    crps: m((p) => p.crps),
    vsLast: 1 - m((p) => p.crps) / m((p) => p.crpsLast),
    vsLeastSquares: 1 - m((p) => p.crps) / m((p) => p.crpsLeastSquares),
    cover50: m(within(0.5)),
    cover80: m(within(0.8)),
    cover95: m(within(0.95)),
    cover80Se: seOver(seasons, within(0.8)),
    pitSd: sd(all.map((p) => p.pit)),
    buckets: Object.fromEntries(
      BUCKETS.map(([name, from, to]) => [
        name,
        mean(all.filter((p) => p.seen >= from && p.seen < to).map(within(0.8))),
      ]),
    ),
    flagged: m((p) => Number(p.flagged)),
    farFlagged: mean(far.map((f) => Number(f.flagged))),
    farCover80: mean(far.map((f) => f.cover80)),
    stated: mean(odds.map((o) => o.stated)),
    offer: mean(odds.map((o) => o.offer)),
    offerSe: seOver(seasons, (p) => (p.odds ? p.odds.offer - p.odds.hold : null)),
    hold: mean(odds.map((o) => o.hold)),
    nudge: mean(odds.map((o) => o.nudge)),
  };
}

type Summary = ReturnType<typeof summarise>;

const f2 = (v: number): string => v.toFixed(2);
const f3 = (v: number): string => v.toFixed(3);

function line(name: string, s: Summary): string {
  const cover = `${f3(s.cover50)} ${f3(s.cover80)}±${f3(s.cover80Se)} ${f3(s.cover95)}`;
  const buckets = Object.values(s.buckets).map(f2).join(' ');
  return `${name.padEnd(18)} ${f3(s.crps)}  ${f2(s.vsLast)} ${f2(s.vsLeastSquares)}  ${cover}  ${f3(s.pitSd)}  ${buckets}  ${f3(s.flagged)} ${f3(s.farFlagged)} ${f2(s.farCover80)}  ${f2(s.stated)} ${f2(s.offer)} ${f2(s.hold)} ${f2(s.nudge)} ±${f3(s.offerSe)}`;
}

const HEADER = `${'generator'.padEnd(18)} crps   skill over  coverage                  pit sd 80 % by passes seen      flagged          P(in band)
${''.padEnd(18)}        last lsq   50    80 ± se     95           8-13 14- 30- 60- 100+   usual far cover  stated offer hold nudge ± se of offer - hold`;

await runCommand(HELP, async (argv) => {
  const args = readArguments(argv, ['--json'], ['--generators', '--seeds']);
  const wanted = args.values.get('--generators')?.split(',');
  const seeds = Number(args.values.get('--seeds') ?? DEFAULT_SEEDS);
  const chosen = GENERATORS.filter((g) => !wanted || wanted.includes(g.name));
  const json = args.flags.has('--json');
  if (!json) process.stdout.write(`${HEADER}\n`);
  const everything: PassScore[][] = [];
  const report: Record<string, Summary> = {};
  for (const g of chosen) {
    const seasons = Array.from({ length: seeds }, (_, s) => scoreSeason(simulateSeason(g, s + 1), g));
    everything.push(...seasons);
    report[g.name] = summarise(seasons);
    if (!json) process.stdout.write(`${line(g.name, report[g.name]!)}\n`);
  }
  report.pooled = summarise(everything);
  process.stdout.write(json ? `${JSON.stringify(report)}\n` : `${line('pooled', report.pooled)}\n`);
});
