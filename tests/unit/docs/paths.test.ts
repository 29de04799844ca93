import { existsSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';

const FOLDERS = /^(src|tests|fixtures|drizzle|public|\.ci)(\/|$)/;

/** Paths named in backquotes or links. Names of files alone are explained by their sentence and not judged. */
function pathsIn(text: string): string[] {
  const named = [...text.matchAll(/`([^`\s]+)`|\]\(([^)\s]+)\)/g)].map((m) => m[1] ?? m[2]!);
  return [...new Set(named.filter((n) => FOLDERS.test(n)))];
}

test.each(['README.md', 'DEVELOPERS.md'])('%s names only paths that exist', (file) => {
  const paths = pathsIn(readFileSync(file, 'utf8'));
  expect(paths.length).toBeGreaterThan(3);
  expect(paths.filter((p) => !existsSync(p))).toEqual([]);
});
