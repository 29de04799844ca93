import { beforeEach, describe, expect, it } from 'vitest';
import { auditEvent, launchSheetSeen } from '@/db/schema';
import { updateAdjustable } from '@/lib/server/cars';
import { decideSuggestion } from '@/lib/server/decisions';
import { currentSheet, getSheet, markSeen } from '@/lib/server/sheets';
import { createSuggestion } from '@/lib/server/suggestions';
import { GET as GET_ONE } from '@/pages/api/launch-sheets/[id]';
import { POST as SEEN } from '@/pages/api/launch-sheets/[id]/seen';
import { GET } from '@/pages/api/launch-sheets/current';
import { callRoute, contextFor, makeTestDb, type World } from '../helpers';
import { CURRENT, readyToAsk } from '../suggestions/season';

let world: World;
let ready: Awaited<ReturnType<typeof readyToAsk>>;
beforeEach(async () => {
  world = await makeTestDb();
  ready = await readyToAsk(world, 12);
});

const driver = (time = '15:30') => contextFor(world, 'driver', 'a', `2026-05-02T${time}:00.000Z`);
const current = (as = driver()) => callRoute(GET, { as, url: `/api/launch-sheets/current?carId=${ready.car.id}` });

async function publish(launchRpm: number) {
  const made = await createSuggestion(contextFor(world, 'tuner'), ready.ask);
  const finalSettings = { ...CURRENT, launch_rpm: launchRpm };
  const chief = contextFor(world, 'crew_chief');
  const { sheet } = await decideSuggestion(chief, made.id, {
    choice: 'adjust',
    finalSettings,
    reason: 'x',
    notes: `rpm ${launchRpm}`,
  });
  return sheet?.id ?? '';
}

describe('the current launch sheet', () => {
  it('is the newest version, for everybody in the team', async () => {
    await publish(7300);
    const id = await publish(7400);
    const { status, body } = await current();
    expect(status).toBe(200);
    expect(body).toMatchObject({
      id,
      version: 2,
      current: true,
      carName: ready.car.name,
      roundName: ready.round.name,
      trackName: 'Mesa Flats',
      lane: 'left',
      notes: 'rpm 7400',
      publishedByName: 'crew_chief of Team A',
      settings: { ...CURRENT, launch_rpm: 7400 },
      seen: [],
    });
    const groups = body.items.map(({ group }: { group: string }) => group);
    expect(groups).toEqual(['clutch', 'clutch', 'clutch', 'launch', 'launch']);
  });

  it('holds no odds and no reasons to argue with', async () => {
    await publish(7300);
    const { body } = await current();
    expect(JSON.stringify(body)).not.toMatch(/pInBand|quantiles|forecast|belief/i);
  });

  it('keeps the labels and limits it was published with', async () => {
    await publish(7300);
    const rpm = ready.car.adjustables.find(({ key }) => key === 'launch_rpm');
    await updateAdjustable(contextFor(world, 'owner'), ready.car.id, rpm?.id ?? '', { label: 'Two-step' });
    const { body } = await current();
    expect(body.items.find(({ key }: { key: string }) => key === 'launch_rpm').label).toBe('Launch rpm');
  });

  it('is a clear 404 before the first one', async () => {
    const { status, body } = await current();
    expect(status).toBe(404);
    expect(body.error.message).toMatch(/No launch sheet has been published/);
    expect(await currentSheet(driver(), { carId: ready.car.id })).toBeNull();
  });

  it('marks an older one as superseded', async () => {
    const first = await publish(7300);
    await publish(7400);
    expect(await getSheet(driver(), first)).toMatchObject({
      version: 1,
      current: false,
      settings: { launch_rpm: 7300 },
    });
  });

  it("is not another team's to read", async () => {
    const id = await publish(7300);
    const theirs = contextFor(world, 'owner', 'b');
    expect((await current(theirs)).status).toBe(404);
    expect((await callRoute(GET_ONE, { as: theirs, params: { id } })).status).toBe(404);
    expect((await callRoute(GET, { as: driver(), url: '/api/launch-sheets/current' })).status).toBe(400);
  });
});

describe('seen', () => {
  it('is kept with name, role and time, once each', async () => {
    const id = await publish(7300);
    const first = await callRoute(SEEN, { as: driver('15:30'), method: 'POST', params: { id } });
    expect(first.status).toBe(200);
    const again = await markSeen(driver('15:40'), id);
    expect(again.seen).toEqual([
      { userId: driver().user.id, name: 'driver of Team A', role: 'driver', seenAt: first.body.seen[0].seenAt },
    ]);
    await Promise.all([markSeen(contextFor(world, 'crew'), id), markSeen(contextFor(world, 'crew'), id)]);
    expect(await world.handle.db.select().from(launchSheetSeen)).toHaveLength(2);
    const audits = (await world.handle.db.select().from(auditEvent)).filter(
      ({ action }) => action === 'launch_sheet.seen',
    );
    expect(audits).toHaveLength(2);
  });

  it("cannot be set on another team's sheet", async () => {
    const id = await publish(7300);
    const answer = await callRoute(SEEN, { as: contextFor(world, 'owner', 'b'), method: 'POST', params: { id } });
    expect(answer.status).toBe(404);
    expect(await world.handle.db.select().from(launchSheetSeen)).toEqual([]);
  });
});
