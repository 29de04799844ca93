/** From shaft pulses to wheel surface speed: plain kinematics, no source needed beyond the definitions. */
import { given, type Maybe } from '../given';
import { M_PER_IN } from '../units';

const SECONDS_PER_MIN = 60;

/** How a car turns shaft turns into road. */
export interface DriveGeometry {
  /** Driveshaft turns per wheel turn. */
  finalDriveRatio: number | null;
  /** Driven-tire circumference at rest, m. */
  rolloutM: number | null;
  /** Relative growth of the rollout per m/s of wheel speed; null or 0 for none. */
  rolloutGrowthPerMps: number | null;
}

/** Wheel turns per minute. */
export function wheelRpm(shaftRpm: Maybe, finalDriveRatio: Maybe): number | null {
  return given([shaftRpm, finalDriveRatio], (rpm, ratio) => (ratio > 0 ? rpm / ratio : null));
}

/** Rollout, m, at a wheel speed: rest rollout x (1 + growth x speed). */
export function rolloutAtSpeedM(rolloutM: Maybe, growthPerMps: Maybe, wheelMps: Maybe): number | null {
  return given([rolloutM, growthPerMps ?? 0, wheelMps], (rest, growth, speed) => {
    const rollout = rest * (1 + growth * speed);
    return rest > 0 && rollout > 0 ? rollout : null;
  });
}

/**
 * Surface speed of the driven wheel, m/s. Growth depends on the speed it raises, so speed = base / (1 - growth x base), where base is the
 * speed on the rollout at rest. Null when the growth has no finite answer at that shaft speed.
 */
export function wheelSpeedMps(shaftRpm: Maybe, drive: DriveGeometry): number | null {
  const turns = wheelRpm(shaftRpm, drive.finalDriveRatio);
  return given([turns, drive.rolloutM, drive.rolloutGrowthPerMps ?? 0], (rpm, rollout, growth) => {
    const base = (rpm / SECONDS_PER_MIN) * rollout;
    const shrink = 1 - growth * base;
    return rollout > 0 && shrink > 0 ? base / shrink : null;
  });
}

/** Shaft turns per minute from the time between two pulses, s. */
export function shaftRpmFromPulse(intervalS: Maybe, pulsesPerTurn: Maybe): number | null {
  return given([intervalS, pulsesPerTurn], (interval, pulses) =>
    interval > 0 && pulses > 0 ? SECONDS_PER_MIN / (interval * pulses) : null,
  );
}

/** Circumference, m, of a tire of this diameter, m. */
export function rolloutFromDiameterM(diameterM: Maybe): number | null {
  return given([diameterM], (diameter) => (diameter > 0 ? Math.PI * diameter : null));
}

/** Common practice, no published source: back a shaft sensor off three turns of its 24-per-inch thread. A maker's gap comes first. */
export const SENSOR_GAP_PRACTICE = { turns: 3, threadsPerInch: 24 } as const;

/** Gap, m, left by backing a threaded sensor off a number of turns. */
export function threadGapM(
  turns: Maybe = SENSOR_GAP_PRACTICE.turns,
  threadsPerInch: Maybe = SENSOR_GAP_PRACTICE.threadsPerInch,
): number | null {
  return given([turns, threadsPerInch], (count, pitch) =>
    count >= 0 && pitch > 0 ? (count / pitch) * M_PER_IN : null,
  );
}
