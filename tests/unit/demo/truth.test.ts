import { describe, expect, it } from 'vitest';
import { START_SETTINGS } from '@/demo/chief';
import { expectedSlipPct, type RunState } from '@/demo/truth';

const WEATHER = {
  airTempC: 25,
  dewPointC: 10,
  trackTempC: 38,
  pressurePa: 98_000,
  densityKgM3: 1.15,
  windMps: 0,
  windDirDeg: 0,
  cloud: 0,
};
const BASE: RunState = {
  weather: WEATHER,
  settings: START_SETTINGS,
  runsOnDiscs: 3,
  lane: 'left',
  place: { track: 0, lanes: { left: 0, right: 0 }, event: 0 },
  passesAtEvent: 2,
  season: 0.5,
};
const slip = (changes: Partial<RunState>) => expectedSlipPct({ ...BASE, ...changes });
const atTrackTemp = (trackTempC: number) => slip({ weather: { ...WEATHER, trackTempC } });
const withSetting = (key: string, steps: number) =>
  slip({ settings: { ...START_SETTINGS, [key]: (START_SETTINGS[key] ?? 0) + steps } });

describe('the invented truth', () => {
  it('has its best grip at one track temperature and loses it faster above than below', () => {
    const best = atTrackTemp(38);
    expect(atTrackTemp(23)).toBeGreaterThan(best + 1);
    expect(atTrackTemp(53)).toBeGreaterThan(atTrackTemp(23) + 1);
  });

  it.each([
    ['counterweight_g', 0.5],
    ['base_pressure_lb', 5],
    ['release_delay_s', -0.02],
    ['launch_rpm', 50],
    ['tire_pressure_psi', 0.2],
  ])('gives 0.2 to 1.2 points more slip for one step of %s (%d)', (key, step) => {
    const more = withSetting(key, step) - slip({});
    expect(more).toBeGreaterThan(0.2);
    expect(more).toBeLessThan(1.2);
  });

  it('saturates: the same step does less when slip is already high', () => {
    const high = slip({ settings: { ...START_SETTINGS, counterweight_g: 17 } });
    const higher = slip({ settings: { ...START_SETTINGS, counterweight_g: 18 } });
    const top = slip({ settings: { ...START_SETTINGS, counterweight_g: 23 } });
    const topmost = slip({ settings: { ...START_SETTINGS, counterweight_g: 24 } });
    expect(topmost - top).toBeLessThan((higher - high) * 0.75);
  });

  it('wears the discs ever less, after a fresh set that bites less', () => {
    const runs = [0, 1, 4, 8, 12].map((runsOnDiscs) => slip({ runsOnDiscs }));
    expect(runs[0]).toBeLessThan(runs[1]!);
    expect(runs[1]! - runs[2]!).toBeGreaterThan(runs[2]! - runs[3]!);
    expect(runs[2]! - runs[3]!).toBeGreaterThan(runs[3]! - runs[4]!);
  });

  it('slips more in dense air and near the dew point', () => {
    expect(slip({ weather: { ...WEATHER, densityKgM3: 1.2 } })).toBeGreaterThan(slip({}));
    expect(slip({ weather: { ...WEATHER, dewPointC: 35 } })).toBeGreaterThan(slip({}) + 0.5);
  });
});
