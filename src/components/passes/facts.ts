/** Every fact of a pass, once: for its page, and to say what a correction changed. */
import { formatNumber, formatQuantity, NO_VALUE, type UnitSystem } from '@/lib/domain/display';
import type { PassView } from '@/lib/server/passes';
import { clockAt, dayAt, LANE_LABEL, OUTCOME_LABEL, type SettingLabel, seconds, slipText } from './pass-text';

interface Fact {
  label: string;
  text(pass: PassView, units: UnitSystem): string;
}

const inSeconds = (value: number | null): string => (value === null ? NO_VALUE : `${seconds(value)} s`);
const time = (label: string, of: (pass: PassView) => number | null): Fact => ({
  label,
  text: (pass) => inSeconds(of(pass)),
});
const speed = (label: string, of: (pass: PassView) => number | null): Fact => ({
  label,
  text: (pass, units) => formatQuantity('speed', of(pass), units),
});

/** Where and when. */
export const PLACE_FACTS: readonly Fact[] = [
  { label: 'Pass', text: ({ passNo }) => String(passNo) },
  { label: 'Run', text: ({ runAt, timeZone }) => `${dayAt(runAt, timeZone)}, ${clockAt(runAt, timeZone)}` },
  { label: 'Round', text: ({ eventName, roundName }) => `${eventName}, ${roundName}` },
];

/** What was measured. */
export const RUN_FACTS: readonly Fact[] = [
  { label: 'Slip', text: ({ slipPct }) => slipText(slipPct) },
  { label: 'Outcome', text: ({ outcome }) => (outcome ? OUTCOME_LABEL[outcome] : NO_VALUE) },
  { label: 'Lane', text: ({ lane }) => (lane ? LANE_LABEL[lane] : NO_VALUE) },
  time('60 ft', (pass) => pass.sixtyFtS),
  time('330 ft', (pass) => pass.threeThirtyFtS),
  time('660 ft', (pass) => pass.eighthS),
  speed('660-ft speed', (pass) => pass.eighthMps),
  time('1000 ft', (pass) => pass.thousandFtS),
  time('1320 ft', (pass) => pass.quarterS),
  speed('1320-ft speed', (pass) => pass.quarterMps),
  { label: 'Runs on the discs', text: ({ runsOnDiscs }) => formatNumber(runsOnDiscs, 0) },
];

const TEXT_FACTS: readonly Fact[] = [
  { label: 'Notes', text: ({ notes }) => notes || NO_VALUE },
  { label: 'Reading', text: ({ readingId }) => readingId ?? NO_VALUE },
  { label: 'Disc set', text: ({ discSetId }) => discSetId ?? NO_VALUE },
];

export interface FactLine {
  label: string;
  value: string;
}

/** The facts that are known; those of `always` also when they are not. */
export function factLines(pass: PassView, units: UnitSystem, always: readonly string[] = []): FactLine[] {
  const lines = RUN_FACTS.map(({ label, text }) => ({ label, value: text(pass, units) }));
  return lines.filter(({ label, value }) => value !== NO_VALUE || always.includes(label));
}

/** What differs between two rows of a pass, in words: "Slip from 15.2 % to 14.8 %". */
export function changesBetween(
  before: PassView,
  after: PassView,
  labels: readonly SettingLabel[],
  units: UnitSystem,
): string[] {
  const facts = [...PLACE_FACTS, ...RUN_FACTS, ...TEXT_FACTS].map(({ label, text }) => ({
    label,
    from: text(before, units),
    to: text(after, units),
  }));
  return [...facts, ...settingChanges(before, after, labels)].filter(({ from, to }) => from !== to).map(sentence);
}

interface Change {
  label: string;
  from: string;
  to: string;
}

function settingChanges(before: PassView, after: PassView, labels: readonly SettingLabel[]): Change[] {
  const keys = [...new Set([...Object.keys(before.settings), ...Object.keys(after.settings)])];
  return keys.map((key) => {
    const { label, unit } = labels.find((one) => one.key === key) ?? { label: key, unit: '' };
    const text = (value: number | undefined) => (value === undefined ? NO_VALUE : `${value} ${unit}`.trim());
    return { label, from: text(before.settings[key]), to: text(after.settings[key]) };
  });
}

const UNSAID = new Set(['Notes', 'Reading', 'Disc set']);

// Ids say nothing to a reader, and notes may be long.
function sentence({ label, from, to }: Change): string {
  if (UNSAID.has(label)) return `${label} changed`;
  if (from === NO_VALUE) return `${label} ${to} added`;
  return to === NO_VALUE ? `${label} ${from} taken out` : `${label} from ${from} to ${to}`;
}
