/**
 * Driven-wheel slip, percent. The product's convention on screen and in files is against GROUND speed: 115 over 100 is 15 %; against wheel
 * speed the same run is 13.04 %. Definition: SAE J670 (2008), longitudinal slip. All give null where the convention is undefined.
 */
import { given, type Maybe } from '../given';

/** Shown next to a slip number. */
export const SLIP_CONVENTION = 'against ground speed';

/** (wheel - ground) / ground, percent. Null at a standstill. */
export function slipGroundRefPct(wheelMps: Maybe, groundMps: Maybe): number | null {
  return given([wheelMps, groundMps], (wheel, ground) => (ground > 0 ? ((wheel - ground) / ground) * 100 : null));
}

/** (wheel - ground) / wheel, percent. Null with the wheel at rest. */
export function slipWheelRefPct(wheelMps: Maybe, groundMps: Maybe): number | null {
  return given([wheelMps, groundMps], (wheel, ground) => (wheel > 0 ? ((wheel - ground) / wheel) * 100 : null));
}

/** Slip against ground speed to slip against wheel speed, both percent. Null at -100 % (locked wheel) and below. */
export function groundToWheelRefPct(groundRefPct: Maybe): number | null {
  return given([groundRefPct], (slip) => (slip > -100 ? slip / (1 + slip / 100) : null));
}

/** Slip against wheel speed to slip against ground speed, both percent. Null at 100 % (car standing) and above. */
export function wheelToGroundRefPct(wheelRefPct: Maybe): number | null {
  return given([wheelRefPct], (slip) => (slip < 100 ? slip / (1 - slip / 100) : null));
}
