/**
 * Air index: the atmospheric factor of SAE J1349 (JUN90 and later), reference 25 degC and 99 kPa of dry air. Above 1 the air is poorer than
 * the reference. It was written for naturally aspirated spark-ignition engines: here it is an index of the air and never a prediction of power.
 */
import { given, type Maybe } from '../given';

/** Shown wherever the number is. */
export const AIR_INDEX_LABEL = 'Air index (dry air, 25 °C / 99 kPa reference)';

/** Where the source calls its formula roughly valid. Outside it the number still ranks air, but no more than that. */
export const AIR_INDEX_STATED_RANGE = { low: 0.93, high: 1.07 } as const;

const REFERENCE_DRY_PA = 99_000;

/** The air index of an air temperature and a dry pressure (station pressure less vapour pressure). */
export function airIndex(tempC: Maybe, dryPressurePa: Maybe): number | null {
  return given([tempC, dryPressurePa], (t, dry) =>
    // 273 and 298 as printed: 273.15 and 298.15 would move the factor by less than 3e-5.
    dry > 0 && t > -273 ? 1.18 * (REFERENCE_DRY_PA / dry) * Math.sqrt((t + 273) / 298) - 0.18 : null,
  );
}
