import { beforeEach, describe, expect, it } from 'vitest';
import { auditEvent, decision, launchSheet, ownEstimate } from '@/db/schema';
import { decideSuggestion } from '@/lib/server/decisions';
import { createSuggestion, getSuggestion, listOwnEstimates, recordOwnEstimate } from '@/lib/server/suggestions';
import { POST as ESTIMATE } from '@/pages/api/own-estimates';
import { POST as DECIDE } from '@/pages/api/suggestions/[id]/decision';
import { callRoute, contextFor, makeTestDb, otherRoles, type World } from '../helpers';
import { CURRENT, readyToAsk } from '../suggestions/season';

let world: World;
let ready: Awaited<ReturnType<typeof readyToAsk>>;
let made: Awaited<ReturnType<typeof createSuggestion>>;
beforeEach(async () => {
  world = await makeTestDb();
  ready = await readyToAsk(world);
  made = await createSuggestion(contextFor(world, 'tuner'), ready.ask);
});

const chief = () => contextFor(world, 'crew_chief');
const decide = (body: unknown, as = chief()) => callRoute(DECIDE, { as, params: { id: made.id }, body });

async function counts() {
  const { db } = world.handle;
  const [decisions, sheets] = [await db.select().from(decision), await db.select().from(launchSheet)];
  return { decisions: decisions.length, sheets: sheets.length };
}

describe('accept', () => {
  it('takes the settings of the offer and publishes them with the changes in work order', async () => {
    const { status, body } = await decide({ choice: 'accept', offerIndex: 0, notes: 'Watch the right lane' });
    const offer = made.result.offers[0];
    expect(status).toBe(201);
    expect(body.decision).toMatchObject({
      choice: 'accept',
      offerIndex: 0,
      finalSettings: offer?.settings,
      decidedByName: 'crew_chief of Team A',
    });
    expect(body.sheet).toMatchObject({
      version: 1,
      settings: offer?.settings,
      notes: 'Watch the right lane',
      current: true,
    });
    const changed = body.sheet.changes.map(({ key, from, to }: { key: string; from: number; to: number }) => ({
      key,
      from,
      to,
    }));
    const expected = offer?.changes.map(({ key, from, to }) => ({ key, from, to })) ?? [];
    expect(changed).toHaveLength(expected.length);
    expect(changed).toEqual(expect.arrayContaining(expected));
    expect(await getSuggestion(chief(), made.id)).toMatchObject({
      decision: { id: body.decision.id, choice: 'accept' },
    });
  });

  it.each([
    [{ choice: 'accept' }, 'offerIndex'],
    [{ choice: 'accept', offerIndex: 7 }, 'offerIndex'],
    [{ choice: 'accept', offerIndex: -1 }, 'offerIndex'],
    [{ choice: 'accept', offerIndex: 0, finalSettings: { ...CURRENT, launch_rpm: 6000 } }, 'finalSettings'],
    [{ choice: 'maybe' }, 'choice'],
    [{}, 'choice'],
  ])('refuses %j naming %s', async (body, field) => {
    const answer = await decide(body);
    expect(answer.status).toBe(400);
    expect(Object.keys(answer.body.error.fields)).toEqual([field]);
    expect(await counts()).toEqual({ decisions: 0, sheets: 0 });
  });
});

describe('adjust', () => {
  const final = { ...CURRENT, launch_rpm: 7400, tire_pressure_psi: 5.8, counterweight_g: 11.5 };

  it('lists what to change on the car, clutch first, with steps and minutes', async () => {
    const { body } = await decide({ choice: 'adjust', offerIndex: 0, finalSettings: final, reason: 'Cloud coming' });
    expect(body.sheet.changes).toMatchObject([
      {
        key: 'counterweight_g',
        from: 11,
        to: 11.5,
        steps: 1,
        minutes: 12,
        label: 'Counterweight',
        unit: 'g',
        group: 'clutch',
      },
      {
        key: 'launch_rpm',
        from: 7200,
        to: 7400,
        steps: 4,
        minutes: 1,
        label: 'Launch rpm',
        unit: 'rpm',
        group: 'launch',
      },
      {
        key: 'tire_pressure_psi',
        from: 6,
        to: 5.8,
        steps: -1,
        minutes: 3,
        label: 'Tire pressure',
        unit: 'psi',
        group: 'launch',
      },
    ]);
    expect(body.sheet.minutes).toBe(16);
    expect(body.sheet.items).toContainEqual(
      expect.objectContaining({
        key: 'launch_rpm',
        label: 'Launch rpm',
        unit: 'rpm',
        group: 'launch',
        value: 7400,
        from: 7200,
      }),
    );
    expect(body.sheet.items).toContainEqual(
      expect.objectContaining({
        key: 'base_pressure_lb',
        label: 'Base pressure',
        unit: 'lb',
        group: 'clutch',
        value: 200,
        from: null,
      }),
    );
    expect(body.warnings).toEqual([]);
  });

  it('lets the chief leave the limits and the steps with a reason, and says so', async () => {
    const wild = { ...CURRENT, launch_rpm: 9400, release_delay_s: 0.413 };
    const { status, body } = await decide({ choice: 'adjust', finalSettings: wild, reason: 'Test' });
    expect(status).toBe(201);
    expect(body.warnings).toEqual([
      expect.stringContaining('Launch rpm 9400 is outside the limits'),
      expect.stringContaining('Release delay 0.413 is not a whole number of steps'),
    ]);
    const rows = await world.handle.db.select().from(auditEvent);
    expect(rows.find(({ action }) => action === 'suggestion.decide')?.detail).toMatchObject({
      warnings: body.warnings,
    });
  });

  it.each([
    [{ choice: 'adjust', finalSettings: final }, ['reason']],
    [{ choice: 'adjust', finalSettings: final, reason: '  ' }, ['reason']],
    [{ choice: 'adjust', reason: 'x' }, Object.keys(CURRENT).map((key) => `finalSettings.${key}`)],
    [{ choice: 'adjust', reason: 'x', finalSettings: { ...CURRENT, turbo: 1 } }, ['finalSettings.turbo']],
    [
      { choice: 'adjust', reason: 'x', finalSettings: { ...CURRENT, launch_rpm: 'fast' } },
      ['finalSettings.launch_rpm'],
    ],
  ])('refuses %j naming %j', async (body, fields) => {
    const answer = await decide(body);
    expect(answer.status).toBe(400);
    expect(Object.keys(answer.body.error.fields).sort()).toEqual([...fields].sort());
    expect(await counts()).toEqual({ decisions: 0, sheets: 0 });
  });
});

describe('decline', () => {
  it('leaves the settings as they stand and publishes them', async () => {
    const { body } = await decide({ choice: 'decline', reason: 'Not for this lane' });
    expect(body.decision).toMatchObject({
      choice: 'decline',
      offerIndex: null,
      finalSettings: CURRENT,
      reason: 'Not for this lane',
    });
    expect(body.sheet).toMatchObject({ settings: CURRENT, changes: [], minutes: 0 });
  });

  it('needs a reason', async () => {
    expect((await decide({ choice: 'decline' })).body.error.fields).toHaveProperty('reason');
  });
});

describe('a decision', () => {
  it('is made once: of two at once one wins and the other is told by whom', async () => {
    const owner = contextFor(world, 'owner');
    const both = await Promise.allSettled([
      decideSuggestion(chief(), made.id, { choice: 'accept', offerIndex: 0 }),
      decideSuggestion(owner, made.id, { choice: 'decline', reason: 'no' }),
    ]);
    expect(both.map(({ status }) => status)).toEqual(['fulfilled', 'rejected']);
    expect(both[1]).toMatchObject({
      reason: { code: 'CONFLICT', message: expect.stringContaining('crew_chief of Team A') },
    });
    expect(await counts()).toEqual({ decisions: 1, sheets: 1 });
  });

  it('can be kept back from publishing', async () => {
    const { body } = await decide({ choice: 'accept', offerIndex: 0, publish: false });
    expect(body.sheet).toBeNull();
    expect(await counts()).toEqual({ decisions: 1, sheets: 0 });
  });

  it('is stored with its sheet or not at all', async () => {
    await world.handle.client.execute(
      "CREATE TRIGGER t BEFORE INSERT ON launch_sheet BEGIN SELECT RAISE(ABORT, 'no'); END",
    );
    await expect(decideSuggestion(chief(), made.id, { choice: 'accept', offerIndex: 0 })).rejects.toThrow();
    expect(await counts()).toEqual({ decisions: 0, sheets: 0 });
  });

  it('raises the version for each sheet of the car', async () => {
    await decide({ choice: 'accept', offerIndex: 0 });
    const second = await createSuggestion(contextFor(world, 'tuner'), ready.ask);
    const { sheet } = await decideSuggestion(chief(), second.id, { choice: 'decline', reason: 'rain' });
    expect(sheet?.version).toBe(2);
  });

  it.each(otherRoles('owner', 'crew_chief'))('is not for a %s', async (role) => {
    const answer = await decide({ choice: 'accept', offerIndex: 0 }, contextFor(world, role));
    expect(answer.status).toBe(403);
    expect(await counts()).toEqual({ decisions: 0, sheets: 0 });
  });

  it('is not for another team', async () => {
    const answer = await decide({ choice: 'accept', offerIndex: 0 }, contextFor(world, 'owner', 'b'));
    expect(answer.status).toBe(404);
    expect(await counts()).toEqual({ decisions: 0, sheets: 0 });
  });

  it('leaves an audit row for itself and one for the sheet', async () => {
    await decide({ choice: 'accept', offerIndex: 0 });
    const actions = (await world.handle.db.select().from(auditEvent)).map(({ action }) => action);
    expect(actions.slice(-2)).toEqual(['suggestion.decide', 'launch_sheet.publish']);
  });
});

describe('the own estimate', () => {
  const estimate = (body: Record<string, unknown>, as = chief()) =>
    callRoute(ESTIMATE, { as, body: { carId: ready.car.id, roundId: ready.round.id, ...body } });

  it('is stored and goes with the decision of its round', async () => {
    const { status, body } = await estimate({ slipPct: '15,5', lowPct: 14, highPct: 17 });
    expect(status).toBe(201);
    expect(body).toMatchObject({
      slipPct: 15.5,
      lowPct: 14,
      highPct: 17,
      skipped: false,
      madeByName: 'crew_chief of Team A',
    });
    expect(await getSuggestion(chief(), made.id)).toMatchObject({ ownEstimate: { id: body.id } });
    const decided = await decide({ choice: 'accept', offerIndex: 0 });
    expect(decided.body.decision.ownEstimateId).toBe(body.id);
    expect(await listOwnEstimates(chief(), { carId: ready.car.id, roundId: ready.round.id })).toHaveLength(1);
    await expect(world.handle.client.execute('UPDATE own_estimate SET slip_pct = 1')).rejects.toThrow(/never edited/);
  });

  it('can be skipped, and that is kept', async () => {
    expect((await estimate({ skipped: true })).body).toMatchObject({ skipped: true, slipPct: null });
  });

  it.each([
    [{}, 'slipPct'],
    [{ slipPct: 'much' }, 'slipPct'],
    [{ slipPct: -3 }, 'slipPct'],
    [{ slipPct: 15, lowPct: 16 }, 'lowPct'],
    [{ slipPct: 15, highPct: 14 }, 'highPct'],
    [{ slipPct: 15, skipped: true }, 'skipped'],
  ])('refuses %j naming %s', async (body, field) => {
    const answer = await estimate(body);
    expect(answer.status).toBe(400);
    expect(Object.keys(answer.body.error.fields)).toEqual([field]);
    expect(await world.handle.db.select().from(ownEstimate)).toEqual([]);
  });

  it('is for those who decide, in their own team', async () => {
    for (const role of otherRoles('owner', 'crew_chief')) {
      const refused = recordOwnEstimate(contextFor(world, role), { ...ready.ask, slipPct: 15 });
      await expect(refused).rejects.toMatchObject({ code: 'FORBIDDEN' });
    }
    expect((await estimate({ slipPct: 15 }, contextFor(world, 'owner', 'b'))).status).toBe(404);
    expect(await world.handle.db.select().from(ownEstimate)).toEqual([]);
  });
});
