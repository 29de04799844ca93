import { plain } from '@/components/site/numbers';
import { formatAbout, formatNumber, formatQuantity, type UnitSystem } from '@/lib/domain/display';
import type { Breakdown, Contribution } from '@/lib/domain/model/contributions';
import type { RunContext } from '@/lib/domain/types';
import { type SettingSpec, settingText, specOf, usualSettingText } from './settings';

/** One line of "Why this forecast". */
export interface FactLine {
  name: string;
  /** "118 °F, usually 101 °F"; empty when there is nothing to say. */
  values: string;
  /** Slip points in tenths, as shown. */
  tenths: number;
  /** "± 0.3"; null when it is not known how well. */
  giveOrTake: string | null;
}

/** The whole of it, in the tenths that are shown: `from` and the tenths of all lines together are exactly `to`. */
export interface BreakdownLines {
  fromTenths: number;
  toTenths: number;
  lines: FactLine[];
}

/** What the values of a fact are written with. */
export interface FactWriter {
  units: UnitSystem;
  specs: readonly SettingSpec[];
  context: RunContext;
}

/** Half a tenth away from zero: a change up and the same change down are shown alike. */
export const tenthsOf = (value: number): number => Math.sign(value) * Math.round(Math.abs(value) * 10);

/**
 * The facts a reader can see, largest first. Those that would show as 0.0, and what rounding leaves over, are one last line, so that
 * the points shown add up to the difference shown.
 */
export function breakdownLines(breakdown: Breakdown, writer: FactWriter): BreakdownLines {
  const [fromTenths, toTenths] = [tenthsOf(breakdown.typicalPct), tenthsOf(breakdown.medianPct)];
  const told = breakdown.contributions.filter((part) => tenthsOf(part.pointsPct) !== 0);
  const folded = breakdown.contributions.filter((part) => tenthsOf(part.pointsPct) === 0);
  const lines = told.map((part) => factLine(part, writer));
  const left = toTenths - fromTenths - lines.reduce((sum, line) => sum + line.tenths, 0);
  return { fromTenths, toTenths, lines: [...lines, ...restLine(folded, left, writer)] };
}

function restLine(folded: readonly Contribution[], tenths: number, writer: FactWriter): FactLine[] {
  if (folded.length === 0 && tenths === 0) return [];
  const names = folded.map((part) => lowerFirst(factName(part, writer)));
  const name = folded.length === 0 ? 'Rounding' : 'Everything else';
  return [{ name, values: names.join(', '), tenths, giveOrTake: null }];
}

function factLine(part: Contribution, writer: FactWriter): FactLine {
  return {
    name: factName(part, writer),
    values: valuesText(part, writer),
    tenths: tenthsOf(part.pointsPct),
    giveOrTake: part.sdPct === null ? null : giveOrTakeText(part.sdPct),
  };
}

const giveOrTakeText = (sdPct: number): string =>
  tenthsOf(sdPct) === 0 ? 'under\u00a00.1' : `± ${formatNumber(sdPct, 1)}`;

const FACT_NAMES: Readonly<Record<string, string>> = {
  'air density': 'Air density',
  'track temperature': 'Track temperature',
  'dew margin': 'Track above dew point',
  discs: 'Runs on the discs',
  lane: 'Lane',
  'round in event': 'Rounds run before at the event',
  track: 'Track',
  event: 'This event so far',
};

const factName = (part: Contribution, { specs }: FactWriter): string =>
  part.kind === 'setting' ? specOf(part.fact, specs).label : (FACT_NAMES[part.fact] ?? upperFirst(part.label));

function valuesText(part: Contribution, writer: FactWriter): string {
  const place = PLACES[part.kind]?.(writer.context);
  if (place !== undefined) return place;
  const { value, typical } = part;
  if (value === null) return 'not known, taken as usual';
  const usual = typical === null ? '' : `, usually ${valueText(part, typical, writer, true)}`;
  return `${valueText(part, value, writer, false)}${usual}`;
}

const PLACES: Partial<Record<Contribution['kind'], (context: RunContext) => string>> = {
  lane: ({ lane }) => (lane === null ? 'not known' : `${lane}, against either`),
  track: ({ track }) => `${track}, against any`,
  event: () => 'its passes, against any event',
};

function valueText(part: Contribution, value: number, { units, specs }: FactWriter, usual: boolean): string {
  if (part.kind === 'setting') {
    const spec = specOf(part.fact, specs);
    return usual ? usualSettingText(value, spec) : settingText(value, spec);
  }
  if (part.fact === 'air density') return formatQuantity('density', value, units);
  if (part.fact === 'track temperature') return formatAbout('trackTemperature', value, units);
  if (part.fact === 'dew margin') return formatAbout('temperatureDifference', value, units);
  return plain(Number(value.toFixed(1)));
}

/** "+1.2", "−0.3", "0.0": slip points from tenths. */
export function pointsText(tenths: number): string {
  if (tenths === 0) return '0.0';
  return `${tenths < 0 ? '−' : '+'}${formatNumber(Math.abs(tenths) / 10, 1)}`;
}

/** "Track temperature 118 °F, usually 101 °F: +1.2 points" */
export const factSentence = (line: FactLine): string =>
  `${line.name} ${line.values}: ${pointsText(line.tenths)} points`.replace('  ', ' ');

const upperFirst = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
const lowerFirst = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);
