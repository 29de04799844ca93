/**
 * Altimeter setting and station pressure: U.S. National Weather Service formula "Altimeter Setting", after Smithsonian Meteorological
 * Tables, 6th rev. ed. (1951) p. 269: A = (p - 0.3)(1 + (1013.25^n 0.0065/288)(h/(p - 0.3)^n))^(1/n) in hPa and m. The 0.3 hPa is its
 * allowance for the height of the barometer: at sea level the station pressure is 0.3 hPa above the setting.
 */

import { given, type Maybe } from '../given';
import { hPaToPa, paToHPa } from '../units';

const N = 0.190284;
const CISTERN_HPA = 0.3;
const PER_M = (1013.25 ** N * 0.0065) / 288;

/** What a pressure reading is: the barometer's own, or corrected to sea level. */
export type PressureKind = 'station' | 'altimeter';

/** Station pressure, Pa, from an altimeter setting and the altitude it was given for. */
export function stationPressurePa(altimeterPa: Maybe, altitudeM: Maybe): number | null {
  return given([altimeterPa, altitudeM], (a, h) => {
    const reduced = paToHPa(a) ** N - PER_M * h;
    return a > 0 && reduced > 0 ? hPaToPa(reduced ** (1 / N) + CISTERN_HPA) : null;
  });
}

/** Altimeter setting, Pa, of a station pressure at an altitude. */
export function altimeterSettingPa(stationPa: Maybe, altitudeM: Maybe): number | null {
  return given([stationPa, altitudeM], (p, h) => {
    const bare = paToHPa(p) - CISTERN_HPA;
    const raised = bare ** N + PER_M * h;
    return bare > 0 && raised > 0 ? hPaToPa(raised ** (1 / N)) : null;
  });
}

/** Station pressure of a reading of either kind. Null when the kind is unknown, or an altimeter setting has no altitude. */
export function stationPressureOf(
  pressurePa: Maybe,
  kind: PressureKind | null | undefined,
  altitudeM: Maybe,
): number | null {
  if (kind === 'altimeter') return stationPressurePa(pressurePa, altitudeM);
  return given([kind === 'station' ? pressurePa : null], (p) => (p > 0 ? p : null));
}
