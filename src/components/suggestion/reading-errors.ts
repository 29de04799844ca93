import { formatNumber, formatPercent, formatQuantity, type UnitSystem } from '@/lib/domain/display';
import type { Reading, ReadingSensitivity, Sensitivity, Shift } from '@/lib/domain/model/sensitivity';
import { percentText } from '@/lib/domain/words';
import { pointsText, tenthsOf } from './breakdown';

/** One line of "If a reading is off". */
export interface ReadingLine {
  name: string;
  /** "118.0 °F, give or take 5.0 °F" */
  values: string;
  lower: ShiftText;
  higher: ShiftText;
}

export interface ShiftText {
  /** Change of the middle, "−0.3" slip points. */
  points: string;
  /** What the odds of the band would then be: "65 %". */
  odds: string;
}

/** Most telling reading first, as the model gives them. */
export const readingLines = (sensitivity: Sensitivity, units: UnitSystem): ReadingLine[] =>
  sensitivity.readings.map((one) => ({
    name: upperFirst(one.label),
    values: `${valueText(one.reading, one.value, units)}, give or take ${errorText(one, units)}`,
    lower: shiftText(one.lower, sensitivity.pInBand),
    higher: shiftText(one.higher, sensitivity.pInBand),
  }));

const shiftText = (shift: Shift, pInBand: number): ShiftText => ({
  points: pointsText(tenthsOf(shift.medianPct)),
  odds: percentText(pInBand + shift.pInBand),
});

const QUANTITY = {
  trackTempC: 'trackTemperature',
  airTempC: 'airTemperature',
  stationPressurePa: 'pressure',
} as const satisfies Partial<Record<Reading, string>>;

const valueText = (reading: Reading, value: number, units: UnitSystem): string =>
  reading === 'relativeHumidity' ? formatPercent(value) : formatQuantity(QUANTITY[reading], value, units);

function errorText({ reading, error }: ReadingSensitivity, units: UnitSystem): string {
  if (reading === 'relativeHumidity') return formatPercent(error);
  const quantity = reading === 'stationPressurePa' ? 'pressure' : 'temperatureDifference';
  return formatQuantity(quantity, error, units);
}

/** Which reading is worth taking again, or that none is. Slip points. */
export function againSentence({ readings, pInBand }: Sensitivity): string {
  const [most] = readings;
  if (!most) return 'No reading was taken, so none can be taken again.';
  const oddsMoved = Math.max(...[most.lower, most.higher].map((s) => Math.abs(s.pInBand)));
  if (tenthsOf(most.spreadPct) === 0 && Math.round(oddsMoved * 100) < 1)
    return 'None of them is worth taking again for this forecast: its usual error would hardly move it.';
  const [low, high] = oddsRange(most, pInBand);
  const odds = low === high ? `leaves the odds at ${low}` : `puts the odds of the band anywhere from ${low} to ${high}`;
  return `If you take one reading again, take the ${most.label}: its usual error moves the middle by ${formatNumber(most.spreadPct, 1)} points and ${odds}.`;
}

function oddsRange({ lower, higher }: ReadingSensitivity, pInBand: number): [string, string] {
  const odds = [0, lower.pInBand, higher.pInBand].map((shift) => pInBand + shift);
  return [percentText(Math.min(...odds)), percentText(Math.max(...odds))];
}

const upperFirst = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
