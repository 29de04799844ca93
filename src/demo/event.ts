import { DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import type { Lane, Settings } from '@/lib/domain/types';
import { addDays, instantOf, type PlannedEvent, type PlannedTrack, type Slot, slotsOf } from './calendar';
import { arrivalSettings, type ChiefView, nextSettings, START_SETTINGS } from './chief';
import { type Making, makePass } from './pass';
import type { Ledger } from './season';
import { drawEvent, type Place } from './truth';
import type { DemoNextRun, DemoPass, DemoReading } from './types';
import { type DayWeather, dayWeather, readingOf, type TrueWeather, weatherAt } from './weather';

const RUNS_PER_DISC_SET = 9;
const READ_BEFORE_H = 0.35;
const MINUTES_LEFT = 40;
const DISCS_IN_SET = 5;

/** One event while it is being run. */
interface EventRun {
  ledger: Ledger;
  plan: PlannedEvent;
  track: PlannedTrack;
  eventRef: string;
  slots: readonly Slot[];
  days: ReadonlyMap<number, DayWeather>;
  place: Place;
}

/** A round with its weather, read but not yet run. */
interface Moment {
  slot: Slot;
  index: number;
  roundRef: string;
  lane: Lane;
  weather: TrueWeather;
  reading: DemoReading;
}

/**
 * Runs an event into the ledger. After `roundsToRun` passes only the reading for the round after them is taken, and what the car stands at is
 * returned; rounds beyond are planned. Null when all were run.
 */
export function runEvent(
  ledger: Ledger,
  plan: PlannedEvent,
  track: PlannedTrack,
  roundsToRun: number,
): DemoNextRun | null {
  const run = beginEvent(ledger, plan, track);
  let memory: Memory = { settings: null, slipPct: null, trackTempC: null };
  changeDiscsBetweenEvents(ledger);
  for (const [index, slot] of run.slots.slice(0, roundsToRun).entries()) {
    memory = makeRun(run, readBefore(run, slot, index, false), memory);
  }
  const waiting = run.slots[roundsToRun];
  if (!waiting) return null;
  const moment = readBefore(run, waiting, roundsToRun, true);
  for (const [offset, slot] of run.slots.slice(roundsToRun + 1).entries()) {
    addRound(run, slot, roundsToRun + 1 + offset, null);
  }
  return nextRun(run, moment, memory.settings ?? START_SETTINGS);
}

function beginEvent(ledger: Ledger, plan: PlannedEvent, track: PlannedTrack): EventRun {
  const { random } = ledger;
  const slots = slotsOf(plan);
  const eventRef = addEvent(ledger, plan, slots);
  const dates = new Set(slots.map(({ day }) => day));
  const days = new Map([...dates].map((day) => [day, dayWeather(track, addDays(plan.startsOn, day), random)]));
  const known = ledger.places.get(track.ref) ?? { track: 0, lanes: { left: 0, right: 0 } };
  return { ledger, plan, track, eventRef, slots, days, place: { ...known, event: drawEvent(random) } };
}

const instantIn = ({ plan, track }: EventRun, slot: Slot, hour: number): string =>
  instantOf(addDays(plan.startsOn, slot.day), hour, track.utcOffset);

function readBefore(run: EventRun, slot: Slot, index: number, careful: boolean): Moment {
  const { random } = run.ledger;
  const lane = drawLane(run.ledger, slot, index);
  const roundRef = addRound(run, slot, index, lane);
  const day = run.days.get(slot.day);
  if (!day) throw new Error(`No weather was drawn for day ${slot.day}.`);
  const weather = weatherAt(day, slot.hour, random);
  return { slot, index, roundRef, lane, weather, reading: addReading(run, slot, roundRef, weather, careful) };
}

function makeRun(run: EventRun, moment: Moment, memory: Memory): Memory {
  const { ledger, track, place } = run;
  const { slot, index, reading } = moment;
  const settings = chosenSettings(memory, moment, ledger);
  const runAt = instantIn(run, slot, slot.hour + ledger.random.integer(0, 12) / 60);
  const pass = addPass(ledger, { ...moment, runAt, settings, place, passesAtEvent: index, track });
  return remember(pass, reading, memory);
}

/** What the chief knows of the pass before. */
interface Memory {
  settings: Settings | null;
  slipPct: number | null;
  trackTempC: number | null;
}

const remember = (pass: DemoPass, reading: DemoReading, before: Memory): Memory => ({
  settings: pass.settings,
  slipPct: pass.outcome === 'aborted' ? before.slipPct : pass.slipPct,
  trackTempC: reading.trackTempC ?? before.trackTempC,
});

function chosenSettings(memory: Memory, { reading, weather, slot }: Moment, { random }: Ledger): Settings {
  const view: ChiefView = {
    lastSlipPct: memory.slipPct,
    trackTempC: reading.trackTempC ?? memory.trackTempC ?? weather.trackTempC,
    lastTrackTempC: memory.trackTempC,
    densityKgM3: weather.densityKgM3,
    test: slot.name.startsWith('T'),
  };
  if (memory.settings === null) return arrivalSettings(view, DEFAULT_ADJUSTABLES, random);
  return nextSettings(memory.settings, view, DEFAULT_ADJUSTABLES, random);
}

function addEvent(ledger: Ledger, plan: PlannedEvent, slots: readonly Slot[]): string {
  const ref = `event-${ledger.events.length + 1}`;
  const endsOn = addDays(plan.startsOn, Math.max(...slots.map(({ day }) => day)));
  ledger.events.push({ ref, trackRef: plan.trackRef, name: plan.name, startsOn: plan.startsOn, endsOn });
  return ref;
}

// Qualifying gives each lane twice; in eliminations the lane is the opponent's or the ladder's choice.
function drawLane({ random }: Ledger, slot: Slot, index: number): Lane {
  const left = slot.name.startsWith('E') ? random.uniform(0, 1) < 0.5 : index % 2 === 0;
  return left ? 'left' : 'right';
}

function addRound(run: EventRun, slot: Slot, index: number, lane: Lane | null): string {
  const { ledger, eventRef } = run;
  const ref = `${eventRef}-${slot.name}`;
  const plannedAt = instantIn(run, slot, slot.hour);
  ledger.rounds.push({ ref, eventRef, name: slot.name, position: index + 1, lane, plannedAt });
  return ref;
}

function addReading(run: EventRun, slot: Slot, roundRef: string, weather: TrueWeather, careful: boolean): DemoReading {
  const { ledger, track, plan } = run;
  const reading: DemoReading = {
    ref: `reading-${ledger.readings.length + 1}`,
    trackRef: track.ref,
    roundRef,
    takenAt: instantIn(run, slot, slot.hour - READ_BEFORE_H),
    ...readingOf(weather, track, { habit: plan.habit, careful }, ledger.random),
    trackTempPlace: 'Groove, 60 ft',
    cloudPct: Math.round(weather.cloud * 10) * 10,
    source: 'hand',
  };
  ledger.readings.push(reading);
  return reading;
}

function changeDiscsBetweenEvents(ledger: Ledger): void {
  if (ledger.runsOnDiscs > RUNS_PER_DISC_SET / 2) ledger.runsOnDiscs = 0;
}

function addPass(ledger: Ledger, making: Making): DemoPass {
  if (ledger.runsOnDiscs >= RUNS_PER_DISC_SET) ledger.runsOnDiscs = 0;
  if (ledger.runsOnDiscs === 0) addDiscSet(ledger);
  const pass = makePass(ledger, making);
  ledger.passes.push(pass);
  ledger.runsOnDiscs += 1;
  return pass;
}

function addDiscSet({ discSets }: Ledger): void {
  const number = discSets.length + 1;
  discSets.push({ ref: `discs-${number}`, name: `Set ${String(number).padStart(2, '0')}`, discCount: DISCS_IN_SET });
}

function nextRun({ ledger, track }: EventRun, { roundRef, reading }: Moment, current: Settings): DemoNextRun {
  return {
    roundRef,
    readingRef: reading.ref,
    current,
    runsOnDiscs: ledger.runsOnDiscs % RUNS_PER_DISC_SET,
    minutesLeft: MINUTES_LEFT,
    at: reading.takenAt,
    utcOffset: track.utcOffset,
  };
}
