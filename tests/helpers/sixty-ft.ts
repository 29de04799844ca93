import { seededRandom } from '@/evaluate/random';
import type { PassRecord } from '@/lib/domain/types';
import { season } from './seasons';

/** What the simulated car's 60-ft time does, in ln seconds. */
export const SIXTY_FT_TRUTH = {
  middleS: 0.95,
  perLaunchStep: -0.004,
  perCounterweightStep: 0.003,
  trackTemp: 0.006,
  noiseSd: 0.012,
};

/** A simulated season whose passes have 60-ft times: launch rpm quickens, counterweight and a hot track slow, each track has its own pace. */
export function sixtyFtSeason(seed: number, truth = SIXTY_FT_TRUTH) {
  const s = season('nonlinear', seed);
  const random = seededRandom(seed + 500);
  const ofTrack = new Map<string, number>();
  const ofEvent = new Map<string, number>();
  const draw = (known: Map<string, number>, key: string, sd: number): number => {
    if (!known.has(key)) known.set(key, random.normal(0, sd));
    return known.get(key)!;
  };
  const log = ({ settings, conditions, track, event }: PassRecord): number =>
    Math.log(truth.middleS) +
    truth.perLaunchStep * ((settings.launch_rpm! - 7250) / 50) +
    truth.perCounterweightStep * ((settings.counterweight_g! - 11) / 0.5) +
    truth.trackTemp * (((conditions.trackTempC ?? 38) - 38) / 10) +
    draw(ofTrack, track, 0.012) +
    draw(ofEvent, event, 0.006);
  const passes = s.passes.map((pass) => {
    const odd = random.uniform(0, 1) < 0.05;
    const time = Math.exp(log(pass) + random.normal(0, truth.noiseSd * (odd ? 4 : 1)));
    return { ...pass, sixtyFtS: Number(time.toFixed(3)) };
  });
  return { passes, adjustables: s.adjustables };
}
