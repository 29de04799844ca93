import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  rolloutAtSpeedM,
  rolloutFromDiameterM,
  SENSOR_GAP_PRACTICE,
  shaftRpmFromPulse,
  threadGapM,
  wheelRpm,
  wheelSpeedMps,
} from '@/lib/domain/slip/drive';
import { groundToWheelRefPct, slipGroundRefPct, slipWheelRefPct, wheelToGroundRefPct } from '@/lib/domain/slip/slip';
import { ftToM, M_PER_FT, M_PER_IN, mphToMps, mpsToMph } from '@/lib/domain/units';
import { type Computed, type Quantity, runCheckPlan, same } from '../../helpers/check-values';

const num = (i: Record<string, Quantity>, name: string): number => i[name]?.value;
const mph = (mps: number | null): number | null => (mps === null ? null : mpsToMph(mps));
const NO_RUN_PHYSICS = 'the product forecasts slip from the team’s own passes; it has no run physics';

runCheckPlan({
  area: 'vehicle_tyre_units',
  ids: (id) => id.startsWith('veh.'),
  formulas: {
    slip: (i) => slips(num(i, 'wheel_speed'), num(i, 'ground_speed')),
    slip_convert: (i) => ({
      ground_to_wheel: same(groundToWheelRefPct(num(i, 'slip'))),
      wheel_to_ground: same(wheelToGroundRefPct(num(i, 'slip'))),
    }),
    wheel_speed: (i) => {
      const drive = {
        finalDriveRatio: num(i, 'final_drive'),
        rolloutM: ftToM(num(i, 'rollout')),
        rolloutGrowthPerMps: 0,
      };
      const speed = wheelSpeedMps(num(i, 'driveshaft_rpm'), drive);
      return {
        wheel_rpm: same(wheelRpm(num(i, 'driveshaft_rpm'), num(i, 'final_drive'))),
        wheel_speed: same(mph(speed)),
        wheel_speed_si: same(speed),
        ...(i.ground_speed ? slips(mph(speed) ?? Number.NaN, num(i, 'ground_speed')) : {}),
      };
    },
    rollout: (i) => {
      const rollout = rolloutFromDiameterM(num(i, 'diameter') * M_PER_IN) ?? Number.NaN;
      return { rollout_in: same(rollout / M_PER_IN), rollout_ft: same(rollout / M_PER_FT), rollout_m: same(rollout) };
    },
    pulse_rpm: (i) => ({ rpm: same(shaftRpmFromPulse(num(i, 'interval'), num(i, 'pulses_per_rev'))) }),
  },
  skippedIds: {
    'veh.constant_power.500hp_3000lb_1320ft': NO_RUN_PHYSICS,
    'veh.constant_power.10000hp_2330lb_1000ft': NO_RUN_PHYSICS,
    'veh.huntington.500_3000': NO_RUN_PHYSICS,
    'veh.accel_avg.60ft': NO_RUN_PHYSICS,
  },
});

function slips(wheelMph: number, groundMph: number): Record<string, Computed> {
  const [wheel, ground] = [mphToMps(wheelMph), mphToMps(groundMph)];
  return {
    slip_ground_ref: same(slipGroundRefPct(wheel, ground)),
    slip_wheel_ref: same(slipWheelRefPct(wheel, ground)),
  };
}

const speed = fc.double({ min: 0.5, max: 160, noNaN: true });
const slip = fc.double({ min: -90, max: 90, noNaN: true });

describe('slip', () => {
  test('the two conventions convert into each other', () => {
    fc.assert(
      fc.property(speed, speed, (wheel, ground) => {
        const ofGround = slipGroundRefPct(wheel, ground) as number;
        const ofWheel = slipWheelRefPct(wheel, ground) as number;
        expect(groundToWheelRefPct(ofGround)).toBeCloseTo(ofWheel, 6);
        const allowed = 1e-6 * Math.max(1, Math.abs(ofGround));
        expect(Math.abs((wheelToGroundRefPct(ofWheel) as number) - ofGround)).toBeLessThan(allowed);
      }),
    );
  });

  test('there and back is the same', () => {
    fc.assert(
      fc.property(slip, (value) => {
        expect(wheelToGroundRefPct(groundToWheelRefPct(value))).toBeCloseTo(value, 9);
      }),
    );
  });

  test('swapping wheel and ground swaps the conventions and the sign', () => {
    fc.assert(
      fc.property(speed, speed, (a, b) => {
        expect(slipGroundRefPct(a, b)).toBeCloseTo(-(slipWheelRefPct(b, a) as number), 9);
      }),
    );
  });

  test('more wheel speed is more slip, and the unit does not matter', () => {
    fc.assert(
      fc.property(speed, speed, (wheel, ground) => {
        const here = slipGroundRefPct(wheel, ground) as number;
        expect(slipGroundRefPct(wheel + 0.1, ground)).toBeGreaterThan(here);
        expect(slipGroundRefPct(mpsToMph(wheel), mpsToMph(ground))).toBeCloseTo(here, 6);
      }),
    );
  });

  test.each([
    ['standing car', slipGroundRefPct(10, 0)],
    ['standing wheel', slipWheelRefPct(0, 10)],
    ['rolling back', slipGroundRefPct(10, -1)],
    ['no wheel speed', slipGroundRefPct(null, 10)],
    ['NaN', slipGroundRefPct(Number.NaN, 10)],
    ['locked wheel', groundToWheelRefPct(-100)],
    ['spinning in place', wheelToGroundRefPct(100)],
    ['no slip', wheelToGroundRefPct(null)],
  ])('%s gives null', (_name, result) => expect(result).toBeNull());
});

describe('drive', () => {
  const drive = { finalDriveRatio: 3.2, rolloutM: 2.9, rolloutGrowthPerMps: 0.0004 };

  test('with growth the speed is turns times the rollout AT that speed', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 100, max: 9000, noNaN: true }),
        fc.double({ min: 0, max: 0.001, noNaN: true }),
        (rpm, growth) => {
          const mps = wheelSpeedMps(rpm, { ...drive, rolloutGrowthPerMps: growth }) as number;
          const grown = rolloutAtSpeedM(drive.rolloutM, growth, mps) as number;
          expect(mps).toBeCloseTo(((wheelRpm(rpm, drive.finalDriveRatio) as number) / 60) * grown, 8);
          expect(mps).toBeGreaterThanOrEqual(wheelSpeedMps(rpm, { ...drive, rolloutGrowthPerMps: null }) as number);
        },
      ),
    );
  });

  test('pulses count the turns', () => {
    fc.assert(
      fc.property(fc.double({ min: 60, max: 12_000, noNaN: true }), fc.integer({ min: 1, max: 60 }), (rpm, pulses) => {
        expect(shaftRpmFromPulse(60 / (rpm * pulses), pulses)).toBeCloseTo(rpm, 6);
      }),
    );
  });

  test('the usual sensor gap is three turns of a 24-per-inch thread', () => {
    expect(SENSOR_GAP_PRACTICE).toEqual({ turns: 3, threadsPerInch: 24 });
    expect(threadGapM()).toBeCloseTo(0.125 * M_PER_IN, 12);
  });

  test.each([
    ['no ratio', wheelSpeedMps(8000, { ...drive, finalDriveRatio: null })],
    ['ratio 0', wheelSpeedMps(8000, { ...drive, finalDriveRatio: 0 })],
    ['no rollout', wheelSpeedMps(8000, { ...drive, rolloutM: null })],
    ['growth without end', wheelSpeedMps(9000, { ...drive, rolloutGrowthPerMps: 0.1 })],
    ['no pulses', shaftRpmFromPulse(0.002, 0)],
    ['no time', shaftRpmFromPulse(0, 4)],
    ['no diameter', rolloutFromDiameterM(0)],
    ['no thread', threadGapM(3, 0)],
  ])('%s gives null', (_name, result) => expect(result).toBeNull());
});
