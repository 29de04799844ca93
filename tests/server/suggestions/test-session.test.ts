import { count } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { auditEvent, suggestion } from '@/db/schema';
import { enterReading } from '@/lib/server/readings';
import { testSession } from '@/lib/server/suggestions';
import { contextFor, makeTestDb, type World } from '../helpers';
import { CURRENT, conditions, readyToAsk } from './season';

let world: World;
let ready: Awaited<ReturnType<typeof readyToAsk>>;
beforeEach(async () => {
  world = await makeTestDb();
  ready = await readyToAsk(world);
});

const crew = () => contextFor(world, 'crew');
const ask = (change: Record<string, unknown> = {}) => ({ ...ready.ask, ...change });

describe('testSession', () => {
  it('proposes runs inside the limits and the time, and a plan that leaves every effect known no worse', async () => {
    const { design, passesUsed, adjustables } = await testSession(crew(), ask({ minutesLeft: 15 }));
    expect(passesUsed).toBe(40);
    expect(design!.hold.changes).toEqual([]);
    expect(design!.ranked.length).toBeGreaterThan(0);
    for (const run of [...design!.ranked, ...design!.plan.runs]) {
      expect(run.minutes).toBeLessThanOrEqual(15);
      for (const { key, low, high } of adjustables) {
        expect(run.settings[key]).toBeGreaterThanOrEqual(low);
        expect(run.settings[key]).toBeLessThanOrEqual(high);
      }
    }
    expect(design!.plan.runs).toHaveLength(3);
    for (const one of design!.plan.learning) expect(one.afterPct).toBeLessThanOrEqual(one.beforePct);
    expect(design!.plan.cut).toBeGreaterThan(0);
  });

  it('stores nothing', async () => {
    const rows = async () => [
      await world.handle.db.select({ n: count() }).from(suggestion),
      await world.handle.db.select({ n: count() }).from(auditEvent),
    ];
    const before = await rows();
    await testSession(crew(), ask());
    expect(await rows()).toEqual(before);
  });

  it('proposes nothing in conditions the passes do not cover, and names them', async () => {
    const hot = await enterReading(contextFor(world, 'owner'), conditions(ready.trackId, { trackTempC: 78 }));
    const { design, outsideVariables } = await testSession(crew(), ask({ readingId: hot.id }));
    expect(design).toBeNull();
    expect(outsideVariables).toContain('track temperature');
  });

  it('proposes nothing with too few passes', async () => {
    const few = await readyToAsk(world, 3, 'b');
    const asked = await testSession(contextFor(world, 'crew', 'b'), few.ask);
    expect(asked).toMatchObject({ design: null, outsideVariables: [], passesUsed: 3, passesNeeded: 8 });
  });

  it('names a setting that is missing', async () => {
    const current = { ...CURRENT, launch_rpm: undefined };
    await expect(testSession(crew(), ask({ current }))).rejects.toThrow(/Launch rpm|launch_rpm/);
  });

  it('is not for the driver, and another team has no such car', async () => {
    await expect(testSession(contextFor(world, 'driver'), ask())).rejects.toMatchObject({ code: 'FORBIDDEN' });
    await expect(testSession(contextFor(world, 'owner', 'b'), ask())).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });
});
