/** Reads the source tree as TypeScript sees it: which file imports what, and which globals it touches. Comments and strings do not count. */
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { dirname, join, posix, relative, sep } from 'node:path';
import { fileURLToPath } from 'node:url';
import ts from 'typescript';

export const ROOT = fileURLToPath(new URL('../../../', import.meta.url));

export interface Import {
  specifier: string;
  /** Erased by the compiler: it ships nothing and runs nothing. */
  typeOnly: boolean;
}

const SOURCE = /\.(ts|tsx|mts|mjs|js|jsx|astro)$/;

/** Repository paths (with /) of every source file below a folder; none when the folder does not exist. */
export function sourceFiles(folder: string): string[] {
  const top = join(ROOT, folder);
  if (!existsSync(top)) return [];
  const found = readdirSync(top, { recursive: true, encoding: 'utf8' }).map((name) => join(top, name));
  return found
    .filter((path) => SOURCE.test(path) && statSync(path).isFile())
    .map((path) => relative(ROOT, path).split(sep).join('/'))
    .sort();
}

/** The script of a file: all of it, or the frontmatter and scripts of an .astro file. */
export function scriptOf(path: string): string {
  const text = readFileSync(join(ROOT, path), 'utf8');
  if (!path.endsWith('.astro')) return text;
  const frontmatter = /^\s*---\n([\s\S]*?)\n---/.exec(text)?.[1] ?? '';
  const scripts = [...text.matchAll(/<script[^>]*>([\s\S]*?)<\/script>/g)].map((match) => match[1]);
  return [frontmatter, ...scripts].join('\n');
}

export const parse = (code: string): ts.SourceFile =>
  ts.createSourceFile('file.tsx', code, ts.ScriptTarget.Latest, true, ts.ScriptKind.TSX);

/** Static, re-exporting, dynamic and required imports of a piece of code. */
export function importsOf(code: string): Import[] {
  const found: Import[] = [];
  const visit = (node: ts.Node): void => {
    const one = importAt(node);
    if (one) found.push(one);
    ts.forEachChild(node, visit);
  };
  visit(parse(code));
  return found;
}

function importAt(node: ts.Node): Import | null {
  if (ts.isImportDeclaration(node)) return named(node.moduleSpecifier, isTypeImport(node));
  if (ts.isExportDeclaration(node) && node.moduleSpecifier) return named(node.moduleSpecifier, node.isTypeOnly);
  if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) return named(node.argument.literal, true);
  if (ts.isCallExpression(node) && isLoader(node.expression)) return named(node.arguments[0], false);
  return null;
}

function isTypeImport({ importClause: clause }: ts.ImportDeclaration): boolean {
  if (!clause) return false;
  if (clause.isTypeOnly) return true;
  const bindings = clause.namedBindings;
  if (clause.name || !bindings || !ts.isNamedImports(bindings)) return false;
  return bindings.elements.length > 0 && bindings.elements.every((element) => element.isTypeOnly);
}

const isLoader = (callee: ts.Expression): boolean =>
  callee.kind === ts.SyntaxKind.ImportKeyword || (ts.isIdentifier(callee) && callee.text === 'require');

// A computed specifier cannot be judged, so it stands out as one that is never allowed.
const named = (node: ts.Node | undefined, typeOnly: boolean): Import => ({
  specifier: node && ts.isStringLiteralLike(node) ? node.text : '<computed>',
  typeOnly,
});

/** Where an import leads: a repository path for our own files, else the package name as written. */
export function targetOf(file: string, specifier: string): string {
  if (specifier.startsWith('@/')) return onDisk(`src/${specifier.slice(2)}`);
  if (specifier.startsWith('.')) return onDisk(posix.normalize(posix.join(dirname(file), specifier)));
  return specifier;
}

const ENDINGS = ['', '.ts', '.tsx', '.mjs', '.js', '.astro', '/index.ts', '/index.tsx'];

function onDisk(path: string): string {
  const bare = path.replace(/\?.*$/, '');
  const hit = ENDINGS.map((ending) => bare + ending).find(isFile);
  return hit ?? bare;
}

const isFile = (path: string): boolean => existsSync(join(ROOT, path)) && statSync(join(ROOT, path)).isFile();

/** Whether a target is a folder of ours or a package (`zod`, `node:fs` by `node:`, `react/jsx-runtime` by `react`). */
export function leadsInto(target: string, place: string): boolean {
  if (place.endsWith(':')) return target.startsWith(place);
  return target === place || target.startsWith(`${place}/`);
}

/** Everything a file pulls in at run time: our own files, followed to the end, and the packages they name. */
export function reachOf(file: string, seen = new Set<string>()): Set<string> {
  if (seen.has(file)) return seen;
  seen.add(file);
  if (!isFile(file) || !SOURCE.test(file)) return seen;
  const values = importsOf(scriptOf(file)).filter(({ typeOnly }) => !typeOnly);
  for (const { specifier } of values) reachOf(targetOf(file, specifier), seen);
  return seen;
}
