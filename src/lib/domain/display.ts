/**
 * What a stored SI number looks like in the team's units: one table for every form, message and table. Formatting is done by hand (fixed
 * decimals, point, comma between thousands), so server and every browser write the same text.
 */
import {
  cDeltaToF,
  cToF,
  fDeltaToC,
  fToC,
  ftToM,
  GRAINS_PER_LB,
  hPaToPa,
  inHgToPa,
  kgM3ToLbFt3,
  kmhToMps,
  lbFt3ToKgM3,
  M_PER_IN,
  mphToMps,
  mpsToKmh,
  mpsToMph,
  mToFt,
  paToHPa,
  paToInHg,
} from './units';

export const UNIT_SYSTEMS = ['us', 'metric'] as const;
export type UnitSystem = (typeof UNIT_SYSTEMS)[number];

/** One quantity in one unit system. */
export interface UnitView {
  unit: string;
  /** Decimals shown; what a trackside instrument resolves. */
  decimals: number;
  toDisplay: (si: number) => number;
  fromDisplay: (value: number) => number;
}

const view = (
  unit: string,
  decimals: number,
  toDisplay: (si: number) => number,
  fromDisplay: (value: number) => number,
): UnitView => ({ unit, decimals, toDisplay, fromDisplay });

const scaled = (unit: string, decimals: number, siPerUnit: number): UnitView =>
  view(
    unit,
    decimals,
    (si) => si / siPerUnit,
    (value) => value * siPerUnit,
  );

const CELSIUS = scaled('°C', 1, 1);
const FAHRENHEIT = view('°F', 1, cToF, fToC);

export const QUANTITIES = {
  airTemperature: { us: FAHRENHEIT, metric: CELSIUS },
  trackTemperature: { us: FAHRENHEIT, metric: CELSIUS },
  /** A difference of temperatures: no offset. */
  temperatureDifference: { us: view('°F', 1, cDeltaToF, fDeltaToC), metric: CELSIUS },
  pressure: { us: view('inHg', 2, paToInHg, inHgToPa), metric: view('hPa', 1, paToHPa, hPaToPa) },
  vapourPressure: { us: view('inHg', 3, paToInHg, inHgToPa), metric: view('hPa', 1, paToHPa, hPaToPa) },
  altitude: { us: view('ft', 0, mToFt, ftToM), metric: scaled('m', 0, 1) },
  windSpeed: { us: view('mph', 0, mpsToMph, mphToMps), metric: view('km/h', 0, mpsToKmh, kmhToMps) },
  density: { us: view('lb/ft³', 4, kgM3ToLbFt3, lbFt3ToKgM3), metric: scaled('kg/m³', 3, 1) },
  /** From a humidity ratio (kg of water per kg of dry air), NOT from AirSummary.grainsPerLb, which is converted already. */
  grains: { us: scaled('gr/lb', 1, 1 / GRAINS_PER_LB), metric: scaled('g/kg', 1, 1e-3) },
  speed: { us: view('mph', 2, mpsToMph, mphToMps), metric: view('km/h', 2, mpsToKmh, kmhToMps) },
  length: { us: view('ft', 1, mToFt, ftToM), metric: scaled('m', 2, 1) },
  rollout: { us: scaled('in', 1, M_PER_IN), metric: scaled('m', 3, 1) },
} as const satisfies Record<string, Record<UnitSystem, UnitView>>;

export type Quantity = keyof typeof QUANTITIES;

/** Unit label, decimals and both conversions of a quantity. */
export function unitView(quantity: Quantity, units: UnitSystem): UnitView {
  return QUANTITIES[quantity][units];
}

export const unitLabel = (quantity: Quantity, units: UnitSystem): string => unitView(quantity, units).unit;

/** Stored value to the team's unit, unrounded. */
export const toDisplay = (quantity: Quantity, si: number, units: UnitSystem): number =>
  unitView(quantity, units).toDisplay(si);

/** A number typed in the team's unit to the stored value. */
export const fromDisplay = (quantity: Quantity, value: number, units: UnitSystem): number =>
  unitView(quantity, units).fromDisplay(value);

/** What stands where nothing was measured. */
export const NO_VALUE = '—';

/** Fixed decimals, comma between thousands, never "-0". The dash when there is no number. */
export function formatNumber(value: number | null | undefined, decimals: number): string {
  if (value == null || !Number.isFinite(value)) return NO_VALUE;
  const fixed = withoutMinusZero(value.toFixed(decimals));
  const [whole = '', fraction] = fixed.split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, ',');
  return fraction === undefined ? grouped : `${grouped}.${fraction}`;
}

const withoutMinusZero = (text: string): string => (/^-0(\.0*)?$/.test(text) ? text.slice(1) : text);

/** A stored value as text in the team's unit, with the unit: "84.2 °F". The dash when there is no number. */
export function formatQuantity(quantity: Quantity, si: number | null | undefined, units: UnitSystem): string {
  const text = formatValue(quantity, si, units);
  return text === NO_VALUE ? text : `${text} ${unitLabel(quantity, units)}`;
}

/** As formatQuantity, without the unit: for tables whose heading names it. */
export function formatValue(quantity: Quantity, si: number | null | undefined, units: UnitSystem): string {
  if (si == null) return NO_VALUE;
  const { decimals, toDisplay: convert } = unitView(quantity, units);
  return formatNumber(convert(si), decimals);
}

/** A typical value with its unit, one decimal less than a reading: "24.2 inHg". */
export function formatAbout(quantity: Quantity, si: number, units: UnitSystem): string {
  const { decimals, unit, toDisplay: convert } = unitView(quantity, units);
  return `${formatNumber(convert(si), Math.max(0, decimals - 1))} ${unit}`;
}

/** A fraction 0-1 as percent: "45 %" of 0.45. */
export function formatPercent(fraction: number | null | undefined, decimals = 0): string {
  return fraction == null ? NO_VALUE : `${formatNumber(fraction * 100, decimals)} %`;
}

const EXTRA_INPUT_DECIMALS = 2;

/** A stored value as a form field shows it: what was typed comes back, no grouping, no trailing zeros; empty for none. */
export function toInputText(quantity: Quantity, si: number | null | undefined, units: UnitSystem): string {
  if (si == null || !Number.isFinite(si)) return '';
  const { decimals, toDisplay: convert } = unitView(quantity, units);
  return String(Number(withoutMinusZero(convert(si).toFixed(decimals + EXTRA_INPUT_DECIMALS))));
}
