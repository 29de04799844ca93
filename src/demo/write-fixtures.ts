/** Writes the example pass files: npx tsx src/demo/write-fixtures.ts. A test holds the committed files against the generator. */
import { mkdirSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { demoFiles, generateDemoSeason } from './index';

const folder = fileURLToPath(new URL('../../fixtures/passes/', import.meta.url));

mkdirSync(folder, { recursive: true });
for (const [name, content] of Object.entries(demoFiles(generateDemoSeason()))) {
  writeFileSync(`${folder}${name}`, content);
  console.log(`fixtures/passes/${name}`);
}
