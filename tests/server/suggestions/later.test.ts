import { beforeEach, describe, expect, it } from 'vitest';
import { updateRound } from '@/lib/server/rounds';
import { createSuggestion, laterRun, type SuggestionView } from '@/lib/server/suggestions';
import { updateTrack } from '@/lib/server/tracks';
import { contextFor, makeTestDb, type World } from '../helpers';
import { readyToAsk } from './season';

let world: World;
let ready: Awaited<ReturnType<typeof readyToAsk>>;
let made: SuggestionView;
beforeEach(async () => {
  world = await makeTestDb();
  ready = await readyToAsk(world);
  await place({ latitudeDeg: 39.5, longitudeDeg: -104.9 });
  made = await createSuggestion(contextFor(world, 'tuner'), ready.ask);
});

const place = (fields: { latitudeDeg: number | null; longitudeDeg: number | null }) =>
  updateTrack(contextFor(world, 'owner'), ready.trackId, fields);
const plan = (plannedAt: string | null) => updateRound(contextFor(world, 'owner'), ready.round.id, { plannedAt });

describe('laterRun', () => {
  it('carries a morning reading to the planned noon: a warmer track, and another slip', async () => {
    const later = await laterRun(contextFor(world, 'crew'), made.id);
    expect(later).toMatchObject({ readAt: '2026-05-02T14:50:00.000Z', plannedAt: '2026-05-02T18:00:00.000Z' });
    expect(later!.trackTempC).toBe(36);
    expect(later!.track.leadHours).toBeCloseTo(190 / 60, 6);
    expect(later!.track.meanC).toBeGreaterThan(37);
    const { pBelow, pInBand, pAbove } = later!.forecast;
    expect(pBelow + pInBand + pAbove).toBeCloseTo(1, 9);
    const middles = [later!.forecast, made.result.noChange!].map((forecast) => forecast.quantiles['0.5']!);
    expect(Math.abs(middles[0]! - middles[1]!)).toBeGreaterThan(0.05);
  });

  it('says nothing where the sun cannot be placed', async () => {
    await place({ latitudeDeg: null, longitudeDeg: null });
    expect(await laterRun(contextFor(world, 'crew'), made.id)).toBeNull();
  });

  it.each([
    ['soon after the reading', '2026-05-02T15:09:00.000Z'],
    ['in the past', '2026-05-02T14:59:00.000Z'],
    ['more than a day off', '2026-05-03T15:00:00.000Z'],
    ['not planned', null],
  ])('says nothing when the run is %s', async (_why, plannedAt) => {
    await plan(plannedAt);
    expect(await laterRun(contextFor(world, 'crew'), made.id)).toBeNull();
  });

  it('is not for the driver, and another team has no such suggestion', async () => {
    await expect(laterRun(contextFor(world, 'driver'), made.id)).rejects.toMatchObject({ code: 'FORBIDDEN' });
    await expect(laterRun(contextFor(world, 'owner', 'b'), made.id)).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });
});
