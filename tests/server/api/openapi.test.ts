import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { CAN } from '@/lib/domain/permissions';
import { API_OPERATIONS } from '@/lib/server/api-table';
import { GET } from '@/pages/api/openapi.json';
import { callRoute } from '../helpers';

const ROOT = join(import.meta.dirname, '../../../src/pages/api');
const METHODS = ['GET', 'POST', 'PATCH', 'PUT', 'DELETE'];

/** "/api/cars/{id}" from "cars/[id]/index.ts". */
function pathOf(file: string): string {
  const route = file
    .replace(/\.ts$/, '')
    .replace(/(^|\/)index$/, '')
    .replace(/\[(\w+)\]/g, '{$1}');
  return `/api/${route}`;
}

async function routesOnDisk(): Promise<string[]> {
  const files = readdirSync(ROOT, { recursive: true, encoding: 'utf8' }).filter((file) => file.endsWith('.ts'));
  const routes = await Promise.all(
    files.map(async (file) => {
      const module = (await import(/* @vite-ignore */ join(ROOT, file))) as Record<string, unknown>;
      return METHODS.filter((method) => method in module).map((method) => `${method} ${pathOf(file)}`);
    }),
  );
  return routes.flat().sort();
}

describe('/api/openapi.json', () => {
  it('describes exactly the routes there are', async () => {
    const described = API_OPERATIONS.map(({ method, path }) => `${method} ${path}`).sort();
    expect(described).toEqual(await routesOnDisk());
  });

  it('is OpenAPI 3.1 with the schemas that check the input', async () => {
    const { status, body } = await callRoute(GET, {});
    expect(status).toBe(200);
    expect(body.openapi).toBe('3.1.0');
    const reading = body.paths['/api/readings'].post.requestBody.content['application/json'].schema;
    expect(reading.required).toEqual(['trackId']);
    expect(Object.keys(reading.properties)).toContain('pressureKind');
    expect(reading.additionalProperties).toBe(false);
    const upload = body.paths['/api/passes/import'].post.requestBody.content['multipart/form-data'].schema;
    expect(upload.required).toEqual(['file', 'carId']);
    const listing = body.paths['/api/passes'].get.parameters;
    expect(listing).toContainEqual(expect.objectContaining({ name: 'carId', in: 'query', required: true }));
    expect(listing).toContainEqual(expect.objectContaining({ name: 'sort', in: 'query', required: false }));
    expect(body.paths['/api/suggestions/{id}/decision'].post['x-roles']).toEqual(CAN['suggestion:decide']);
    expect(body.paths['/api/health'].get).not.toHaveProperty('security');
  });

  it('gives every part of a path that varies as a parameter', async () => {
    const { body } = await callRoute(GET, {});
    for (const [path, operations] of Object.entries<Record<string, { parameters: { name: string; in: string }[] }>>(
      body.paths,
    )) {
      const names = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
      for (const { parameters } of Object.values(operations)) {
        expect(parameters.filter((one) => one.in === 'path').map(({ name }) => name)).toEqual(names);
      }
    }
  });
});
