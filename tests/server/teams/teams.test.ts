import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { auditEvent, team } from '@/db/schema';
import { ROLES } from '@/lib/domain/permissions';
import { me, updateTeam } from '@/lib/server/teams';
import { GET as health } from '@/pages/api/health';
import { GET as meRoute } from '@/pages/api/me';
import { callRoute, contextFor, makeTestDb, otherRoles, type World } from '../helpers';

let world: World;
beforeEach(async () => {
  world = await makeTestDb();
});

const stored = async (id: string) => (await world.handle.db.select().from(team).where(eq(team.id, id)))[0];

describe('me', () => {
  it.each(ROLES)('tells a %s who they are, and nothing of another team', async (role) => {
    const ctx = contextFor(world, role);
    expect(await me(ctx)).toEqual({
      user: ctx.user,
      team: { id: ctx.team.id, name: 'Team A', units: 'us' },
      role,
      teams: [{ id: ctx.team.id, name: 'Team A', role }],
    });
  });

  it('answers 401 to nobody', async () => {
    expect(await callRoute(meRoute)).toMatchObject({ status: 401, body: { error: { code: 'UNAUTHENTICATED' } } });
  });
});

describe('updateTeam', () => {
  it('switches the units of the own team only, with an audit row', async () => {
    expect(await updateTeam(contextFor(world, 'owner'), { units: 'metric' })).toMatchObject({
      units: 'metric',
      name: 'Team A',
    });
    expect(await stored(world.a.team.id)).toMatchObject({ units: 'metric' });
    expect(await stored(world.b.team.id)).toMatchObject({ units: 'us', name: 'Team B' });
    const rows = await world.handle.db.select().from(auditEvent).where(eq(auditEvent.action, 'team.update'));
    expect(rows.map(({ detail }) => detail)).toEqual([{ units: { from: 'us', to: 'metric' } }]);
  });

  it('cannot be pointed at another team', async () => {
    await updateTeam(contextFor(world, 'owner'), { name: 'New name', id: world.b.team.id, teamId: world.b.team.id });
    expect(await stored(world.b.team.id)).toMatchObject({ name: 'Team B' });
  });

  it('refuses other units', async () => {
    await expect(updateTeam(contextFor(world, 'owner'), { units: 'imperial' })).rejects.toThrow(/us or metric/);
  });

  it.each(otherRoles('owner'))('refuses a %s', async (role) => {
    await expect(updateTeam(contextFor(world, role), { units: 'metric' })).rejects.toMatchObject({ code: 'FORBIDDEN' });
  });
});

describe('health', () => {
  it('says that the database answers, and when it does not', async () => {
    expect(await callRoute(health)).toMatchObject({ status: 200, body: { ok: true, database: 'ok' } });
    const logged = vi.spyOn(console, 'error').mockImplementation(() => undefined);
    world.handle.close();
    const { status, body } = await callRoute(health);
    expect(logged).toHaveBeenCalledOnce();
    logged.mockRestore();
    expect(status).toBe(503);
    expect(body).toEqual({ ok: false, database: 'unavailable' });
    await world.handle.client.reconnect();
  });
});
