import type { Random } from '@/evaluate/random';
import type { Lane, Outcome, Settings } from '@/lib/domain/types';
import type { PlannedTrack } from './calendar';
import type { Ledger } from './season';
import { abortedTimes, timesOf } from './timing';
import { drawSlip, expectedSlipPct, type Mishap, type Place } from './truth';
import type { DemoPass, DemoReading } from './types';
import type { TrueWeather } from './weather';

/** What is known at the line. */
export interface Making {
  roundRef: string;
  reading: DemoReading;
  runAt: string;
  lane: Lane;
  settings: Settings;
  weather: TrueWeather;
  place: Place;
  passesAtEvent: number;
  track: PlannedTrack;
}

/** About how many passes a season has, for the slow drift of the car. */
const SEASON_PASSES = 140;
const ABORTED_SHARE = 0.03;
const SLIP_NOT_READ_SHARE = 0.04;

/** Passes left out of the model, by number, with what was wrong with them. */
const EXCLUDED: ReadonlyMap<number, string> = new Map([
  [37, 'Driveshaft sensor came loose: the slip is not to be trusted.'],
  [88, 'Oil on the strip from the pair before; the run says nothing about the set-up.'],
  [113, 'Ran on the old tires by mistake.'],
]);

const NOTES: Readonly<Record<Outcome, readonly string[]>> = {
  clean: ['', '', '', '', 'Straight, front wheels down by 60 ft.', 'Moved a little to the outside, no lift.'],
  shake: ['Shook at about 150 ft, driver lifted and got back on.', 'Hard shake early; check wheelie bar height.'],
  smoke: ['Smoked the tires past 100 ft, pedaled twice.', 'Broke loose when the second stage came in.'],
  aborted: ['Shut off after the burnout problem showed again.', 'Driver clicked it off before half track.'],
};

/** Runs one pass. The next pass number and the disc count come from the ledger. */
export function makePass({ random, passes, discSets, runsOnDiscs }: Ledger, making: Making): DemoPass {
  const passNo = passes.length + 1;
  const excludedReason = EXCLUDED.get(passNo) ?? null;
  const season = passNo / SEASON_PASSES;
  const expected = expectedSlipPct({ ...making, runsOnDiscs, season });
  const { slipPct, mishap } = drawSlip(excludedReason ? expected * 1.5 : expected, random);
  const aborted = random.uniform(0, 1) < ABORTED_SHARE;
  const outcome = aborted ? 'aborted' : outcomeOf(mishap);
  const times = timesOf(slipPct, making.weather.densityKgM3, mishap, random);
  const slip = readSlip(slipPct, aborted, random);
  return {
    ref: `pass-${passNo}`,
    roundRef: making.roundRef,
    readingRef: making.reading.ref,
    passNo,
    runAt: making.runAt,
    utcOffset: making.track.utcOffset,
    lane: making.lane,
    settings: making.settings,
    runsOnDiscs,
    discSetRef: discSets.at(-1)?.ref ?? '',
    slipPct: slip,
    slipSource: slip === null ? null : 'measured',
    ...(aborted ? abortedTimes(times, random) : times),
    outcome,
    excluded: excludedReason !== null,
    excludedReason,
    notes: noteFor(outcome, random),
    source: 'hand',
  };
}

const outcomeOf = (mishap: Mishap): Outcome => (mishap === 'none' ? 'clean' : mishap);

// An aborted pass was often over before the slip window was.
function readSlip(slipPct: number, aborted: boolean, random: Random): number | null {
  const lost = random.uniform(0, 1) < (aborted ? 0.5 : SLIP_NOT_READ_SHARE);
  return lost ? null : Number((slipPct * Math.exp(random.normal(0, 0.015))).toFixed(1));
}

function noteFor(outcome: Outcome, random: Random): string {
  const choices = NOTES[outcome];
  return choices[random.integer(0, choices.length - 1)] ?? '';
}
