import { join } from 'node:path';
import type { APIRoute } from 'astro';
import { beforeAll, describe, expect, it } from 'vitest';
import { can, type Right, ROLES } from '@/lib/domain/permissions';
import { API_OPERATIONS, type ApiOperation } from '@/lib/server/api-table';
import { callRoute, contextFor, makeTestDb, type World } from '../helpers';

const ROOT = join(import.meta.dirname, '../../../src/pages');

let world: World;
beforeAll(async () => {
  world = await makeTestDb();
});

async function routeOf({ method, path }: ApiOperation): Promise<APIRoute> {
  const file = path.replace(/\{(\w+)\}/g, '[$1]');
  const module = await import(/* @vite-ignore */ join(ROOT, `${file}.ts`)).catch(
    () => import(/* @vite-ignore */ join(ROOT, file, 'index.ts')),
  );
  return module[method];
}

const options = ({ method, path, multipart }: ApiOperation) => ({
  method,
  params: { id: 'none', adjustableId: 'none' },
  url: path.replace(/[{}]/g, ''),
  ...(method === 'GET' ? {} : { body: multipart ? formWithCar() : {} }),
});

function formWithCar(): FormData {
  const form = new FormData();
  form.set('carId', 'none');
  return form;
}

const guarded = API_OPERATIONS.filter((one) => one.right !== 'public' && one.right !== null);

describe('every route of the API', () => {
  it('has something to guard', () => {
    expect(guarded.length).toBeGreaterThan(30);
  });

  it.each(guarded.map((one) => [`${one.method} ${one.path}`, one] as const))(
    '%s asks for its right',
    async (_name, one) => {
      const route = await routeOf(one);
      for (const role of ROLES) {
        const { status, body } = await callRoute(route, { ...options(one), as: contextFor(world, role) });
        // What may be asked is refused for its input or its missing id, and never for the role.
        expect(status === 403, `${role}: ${status} ${JSON.stringify(body)}`).toBe(!can(role, one.right as Right));
        expect(status, JSON.stringify(body)).toBeLessThan(500);
      }
      expect((await callRoute(route, { ...options(one), as: null })).status).toBe(401);
    },
  );
});
