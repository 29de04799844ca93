import { describe, expect, test } from 'vitest';
import { impuritiesOf } from './impurities';
import { importsOf, leadsInto, reachOf, scriptOf, sourceFiles, targetOf } from './source-files';

describe('the domain core is pure', () => {
  const files = sourceFiles('src/lib/domain');

  test('there is a domain core to judge', () => {
    expect(files.length).toBeGreaterThan(20);
    for (const known of ['src/lib/domain/types.ts', 'src/lib/domain/air/density.ts', 'src/lib/domain/permissions.ts']) {
      expect(files).toContain(known);
    }
    const imports = files.flatMap((file) => importsOf(scriptOf(file)));
    expect(imports.length).toBeGreaterThan(files.length / 2);
  });

  test.each(files)('%s', (file) => {
    expect(impuritiesOf(file, scriptOf(file))).toEqual([]);
  });
});

describe('what counts as impure', () => {
  const file = 'src/lib/domain/air/example.ts';

  test.each([
    ["import { readFileSync } from 'node:fs';", 'imports node:fs'],
    ["import { z } from 'zod';", 'imports zod'],
    ["import type { z } from 'zod';", 'imports zod'],
    ["import '../../server/context';", 'imports ../../server/context'],
    ["export * from '@/db/client';", 'imports @/db/client'],
    ["const a = await import('luxon');", 'imports luxon'],
    ["const a = require('react');", 'imports react'],
    ['const a = await import(name);', 'imports <computed>'],
    ["let a: import('drizzle-orm').SQL;", 'imports drizzle-orm'],
    ["import x from 'suncalc/other';", 'imports suncalc/other'],
    ['const t = Date.now();', 'Date.now'],
    ["const t = Date['now']();", 'Date.now'],
    ['const now = Date.now; ', 'Date.now'],
    ['const t = new Date();', 'new Date()'],
    ['const t = new Date;', 'new Date()'],
    ['const t = Date();', 'Date()'],
    ['const r = Math.random();', 'Math.random'],
    ["const e = process.env['HOME'];", 'process'],
    ['console.log(1);', 'console'],
    ['const c = globalThis.crypto;', 'globalThis'],
    ['const n = (1234).toLocaleString();', 'toLocaleString'],
  ])('%s', (code, finding) => {
    expect(impuritiesOf(file, code)).toEqual([finding]);
  });

  test.each([
    "import { getPosition } from 'suncalc';",
    "import { inverse } from 'ml-matrix';",
    "import { cToF } from '../units';",
    "import type { Band } from '@/lib/domain/types';",
    'const t = new Date(iso);',
    '// Date.now() and console.log are not used here',
    "const text = 'process.env';",
    'const a = { process: 1 }; a.process;',
  ])('%s is fine', (code) => {
    expect(impuritiesOf(file, code)).toEqual([]);
  });
});

interface Layer {
  folder: string;
  /** Folders and packages it must not import, types included. */
  never: string[];
}

const SCREENS = ['src/pages', 'src/components', 'src/layouts', 'react', 'react-dom', 'astro:'];

/** Imports run one way: pages and api, then server, then domain and db. */
const LAYERS: Layer[] = [
  { folder: 'src/db', never: [...SCREENS, 'src/lib/server', 'src/lib/forms', 'src/lib/pass-csv'] },
  { folder: 'src/lib/forms', never: [...SCREENS, 'src/db', 'src/lib/server', 'drizzle-orm', '@libsql', 'node:'] },
  { folder: 'src/lib/pass-csv', never: [...SCREENS, 'src/db', 'src/lib/server', 'drizzle-orm', '@libsql'] },
  { folder: 'src/lib/server', never: SCREENS },
];

function wrongWay({ folder, never }: Layer): string[] {
  return sourceFiles(folder).flatMap((file) => wrongImports(file, scriptOf(file), never));
}

const wrongImports = (file: string, code: string, never: string[]): string[] =>
  importsOf(code)
    .filter(({ specifier }) => never.some((place) => leadsInto(targetOf(file, specifier), place)))
    .map(({ specifier }) => `${file} imports ${specifier}`);

describe('imports run one way', () => {
  test.each(LAYERS)('$folder', (layer) => {
    const files = sourceFiles(layer.folder);
    expect(files.length).toBeGreaterThan(0);
    expect(files.flatMap((file) => importsOf(scriptOf(file))).length).toBeGreaterThan(0);
    expect(wrongWay(layer)).toEqual([]);
  });

  test('a wrong import is found, however it is written', () => {
    const file = 'src/lib/forms/example.ts';
    const never = LAYERS.find(({ folder }) => folder === 'src/lib/forms')?.never ?? [];
    for (const specifier of [
      '@/db/client',
      '../../db/client',
      '@/lib/server/context',
      'react',
      'astro:env/server',
      'node:fs',
    ]) {
      expect(wrongImports(file, `import { x } from '${specifier}';`, never), specifier).toHaveLength(1);
    }
    expect(
      wrongImports(file, "import { z } from 'zod'; import type { Band } from '@/lib/domain/types';", never),
    ).toEqual([]);
  });
});

describe('islands ship no server code', () => {
  // zod alone would eat half the script budget of a page; the rest cannot run in a browser at all.
  const NEVER_SHIPPED = [
    'zod',
    'src/lib/forms',
    'src/lib/server',
    'src/db',
    'drizzle-orm',
    '@libsql',
    'node:',
    'lucia',
    'csv-parse',
  ];
  const islands = sourceFiles('src/components/islands').filter((file) => file.endsWith('.tsx'));

  test('there are islands to judge', () => expect(islands.length).toBeGreaterThan(0));

  test.each(islands)('%s', (file) => {
    const shipped = [...reachOf(file)].filter((target) => NEVER_SHIPPED.some((place) => leadsInto(target, place)));
    expect(shipped).toEqual([]);
  });

  test('the reach of a file is followed through our own files to the packages', () => {
    const reach = reachOf('src/lib/domain/air/plausibility.ts');
    expect(reach).toContain('src/lib/domain/air/sun.ts');
    expect(reach).toContain('suncalc');
    expect([...reachOf('src/lib/server/errors.ts')].length).toBeGreaterThan(0);
    expect([...reachOf('src/lib/forms/fields.ts')]).toContain('zod');
  });
});
