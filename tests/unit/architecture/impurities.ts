import ts from 'typescript';
import { importsOf, leadsInto, parse, targetOf } from './source-files';

const DOMAIN = 'src/lib/domain';
export const ALLOWED_PACKAGES = ['ml-matrix', 'ml-regression', 'simple-statistics', 'suncalc'];

const GLOBALS = [
  'process',
  'console',
  'globalThis',
  'performance',
  'crypto',
  'fetch',
  'setTimeout',
  'setInterval',
  'localStorage',
  'Intl',
];
const MEMBERS = ['Date.now', 'Math.random'];
const LOCALE_METHODS = ['toLocaleString', 'toLocaleDateString', 'toLocaleTimeString'];

/** Everything in a domain file that makes its results depend on more than its inputs. */
export function impuritiesOf(file: string, code: string): string[] {
  const outside = importsOf(code)
    .map(({ specifier }) => ({ specifier, target: targetOf(file, specifier) }))
    .filter(({ target }) => !leadsInto(target, DOMAIN) && !ALLOWED_PACKAGES.includes(target))
    .map(({ specifier }) => `imports ${specifier}`);
  return [...outside, ...impureUses(code)];
}

function impureUses(code: string): string[] {
  const found: string[] = [];
  const visit = (node: ts.Node): void => {
    const use = impureUse(node);
    if (use) found.push(use);
    ts.forEachChild(node, visit);
  };
  visit(parse(code));
  return found;
}

function impureUse(node: ts.Node): string | null {
  if (ts.isNewExpression(node)) return isDate(node.expression) && !node.arguments?.length ? 'new Date()' : null;
  if (ts.isCallExpression(node) && isDate(node.expression)) return 'Date()';
  if (ts.isElementAccessExpression(node)) return impureElement(node);
  if (ts.isPropertyAccessExpression(node)) return impureMember(node);
  return ts.isIdentifier(node) && GLOBALS.includes(node.text) && isReference(node) ? node.text : null;
}

const isDate = (node: ts.Node): boolean => ts.isIdentifier(node) && node.text === 'Date';

function impureElement(node: ts.ElementAccessExpression): string | null {
  const key = ts.isStringLiteralLike(node.argumentExpression) ? node.argumentExpression.text : '';
  const member = `${node.expression.getText()}.${key}`;
  return MEMBERS.includes(member) ? member : null;
}

function impureMember(node: ts.PropertyAccessExpression): string | null {
  const member = `${node.expression.getText()}.${node.name.text}`;
  if (MEMBERS.includes(member)) return member;
  return LOCALE_METHODS.includes(node.name.text) ? node.name.text : null;
}

/** A use of the global, not a property or a key that happens to share its name. */
function isReference(node: ts.Identifier): boolean {
  const { parent } = node;
  if (ts.isPropertyAccessExpression(parent)) return parent.expression === node;
  return (
    !(ts.isPropertyAssignment(parent) || ts.isPropertySignature(parent) || ts.isMethodDeclaration(parent)) ||
    parent.name !== node
  );
}
