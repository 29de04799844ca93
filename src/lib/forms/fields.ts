/**
 * Shared pieces of the input schemas. A form post delivers strings and JSON delivers numbers: both are accepted, a comma or a
 * point as the decimal sign, and an empty string is "not given" where a field is optional. Every message names the fix.
 * Server side only: islands never import this (zod would eat the script budget).
 */
import { DateTime, IANAZone } from 'luxon';
import { z } from 'zod';
import { parseDecimal } from '@/lib/domain/decimal';
import { parseInstant } from './instants';

export { parseDecimal } from '@/lib/domain/decimal';
export { localInputValue, parseInstant, zonedInstant } from './instants';

export interface NumberRule {
  /** How the message names the field, e.g. "The step". */
  label: string;
  unit?: string;
  low: number;
  high: number;
  integer?: boolean;
  /** Added to the range message when the likely slip is known, e.g. "Enter feet, not meters." */
  hint?: string;
}

/** A required number within its range. */
export function decimal(rule: NumberRule) {
  return z
    .union([z.number(), z.string()], { error: `${rule.label} is missing. Enter a number.` })
    .transform((value, ctx) => toNumber(value, rule, ctx))
    .pipe(z.number());
}

/** An optional number: absent, null and "" all mean null. */
export function optionalDecimal(rule: NumberRule) {
  return z
    .union([z.number(), z.string(), z.null()], { error: notANumber(rule) })
    .optional()
    .transform((value, ctx) => (isBlank(value) ? null : toNumber(value as number | string, rule, ctx)))
    .pipe(z.number().nullable());
}

const isBlank = (value: unknown): boolean => value == null || (typeof value === 'string' && value.trim() === '');

function toNumber(value: number | string, rule: NumberRule, ctx: z.RefinementCtx): number {
  const number = typeof value === 'number' ? value : parseDecimal(value);
  const problem = numberProblem(number, value, rule);
  if (problem === null && number !== null) return number;
  ctx.addIssue({ code: 'custom', message: problem ?? notANumber(rule) });
  return z.NEVER;
}

function numberProblem(number: number | null, typed: number | string, rule: NumberRule): string | null {
  if (number === null) return isBlank(typed) ? `${rule.label} is missing. Enter a number.` : notANumber(rule);
  if (isAmbiguous(number, typed, rule)) return askBack(number, typed, rule);
  if (rule.integer && !Number.isInteger(number)) return `${rule.label} must be a whole number.`;
  if (number < rule.low || number > rule.high) return outOfRange(rule);
  return null;
}

/** "7,550" is 7550 to one reader and 7.55 to another. */
const COMMA_EITHER_WAY = /^[+-]?[1-9]\d{0,2},\d{3}$/;

// Only where both would be taken: nobody means a 60-ft time of a thousand seconds.
const isAmbiguous = (number: number, typed: number | string, { low, high }: NumberRule): boolean =>
  typeof typed === 'string' && COMMA_EITHER_WAY.test(typed.trim()) && number * 1000 >= low && number * 1000 <= high;

const askBack = (number: number, typed: number | string, { label }: NumberRule): string =>
  `${label}: is ${typed} meant as ${Math.round(number * 1000)} or as ${number}? Type it without the comma.`;

const notANumber = (rule: NumberRule): string =>
  `${rule.label} must be a plain number such as 12.5, with no unit or spaces.`;

function outOfRange({ label, unit, low, high, hint }: NumberRule): string {
  const range = `${label} must be between ${low} and ${high}${unit ? ` ${unit}` : ''}.`;
  return hint ? `${range} ${hint}` : range;
}

// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is refused here
const CONTROL = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/;

/** A required single line, trimmed; runs of white space become one space. `label` starts the message: "The car name". */
export function text(label: string, max: number) {
  return z
    .string({ error: `${label} is missing.` })
    .transform((value) => value.trim().replace(/\s+/g, ' '))
    .pipe(
      z
        .string()
        .min(1, `${label} is missing.`)
        .max(max, `${label} is too long: keep it to ${max} characters.`)
        .refine((value) => !CONTROL.test(value), `${label} holds characters that cannot be shown. Retype it.`),
    );
}

/** An optional text, several lines allowed; absent and null mean "". */
export function optionalText(label: string, max: number) {
  return z
    .union([z.string(), z.null()], { error: `${label} must be text.` })
    .optional()
    .transform((value) => (value ?? '').replace(/\r\n?/g, '\n').trim())
    .pipe(
      z
        .string()
        .max(max, `${label} is too long: keep it to ${max} characters.`)
        .refine((value) => !CONTROL.test(value), `${label} holds characters that cannot be shown. Retype it.`),
    );
}

/** The id of something the team has, as a list gave it. Whether it exists is the verb's question. */
export const idField = (message: string) => z.string({ error: message }).trim().min(1, message).max(64, message);

/** An optional id: absent, null and "" mean null. */
export const optionalId = (message: string) =>
  z
    .union([z.string().max(64, message), z.null()], { error: message })
    .optional()
    .transform((value) => value?.trim() || null);

/** One of a fixed list. */
export const choice = <const T extends readonly [string, ...string[]]>(values: T, message: string) =>
  z.enum(values, { error: message });

/** One of a fixed list, or not given: absent, null and "" mean null. */
export const optionalChoice = <const T extends readonly [string, ...string[]]>(values: T, message: string) =>
  z
    .union([z.enum(values), z.literal(''), z.null()], { error: message })
    .optional()
    .transform((value) => value || null);

const FLAG: Record<string, boolean> = {
  true: true,
  on: true,
  '1': true,
  false: false,
  off: false,
  '0': false,
  '': false,
};

/** Yes or no: a boolean, or what a checkbox posts. */
export const flag = (message: string) =>
  z.union([z.boolean(), z.enum(Object.keys(FLAG) as [string, ...string[]])], { error: message }).transform((value) => {
    return typeof value === 'boolean' ? value : FLAG[value] === true;
  });

const instantMessage = (label: string): string =>
  `${label} must be a date and time with its offset, such as 2026-05-03T14:05-06:00.`;

/** A required instant, to UTC. */
export function isoInstant(label: string) {
  return z
    .string({ error: instantMessage(label) })
    .transform((value, ctx) => instantOrIssue(value, label, ctx))
    .pipe(z.string());
}

/** An optional instant: absent, null and "" mean null. */
export function optionalInstant(label: string) {
  return z
    .union([z.string(), z.null()], { error: instantMessage(label) })
    .optional()
    .transform((value, ctx) => (isBlank(value) ? null : instantOrIssue(value as string, label, ctx)))
    .pipe(z.string().nullable());
}

function instantOrIssue(value: string, label: string, ctx: z.RefinementCtx): string {
  const instant = parseInstant(value);
  if (instant !== null) return instant;
  ctx.addIssue({ code: 'custom', message: instantMessage(label) });
  return z.NEVER;
}

/** A calendar date at the track, yyyy-mm-dd. */
export const calendarDate = (label: string) =>
  z
    .string({ error: `${label} is missing. Enter a date.` })
    .trim()
    .refine(
      (value) => /^\d{4}-\d{2}-\d{2}$/.test(value) && DateTime.fromISO(value).isValid,
      `${label} must be a date such as 2026-05-03.`,
    );

export const timeZone = (label: string) =>
  z
    .string({ error: `${label} is missing. Enter one such as America/Denver.` })
    .trim()
    .max(64)
    .refine((value) => IANAZone.isValidZone(value), `${label} must be an IANA zone such as America/Denver.`);

/** Lower case, trimmed: the one form an address is stored and looked up in. */
export const email = () =>
  z
    .string({ error: 'Enter your email address.' })
    .trim()
    .toLowerCase()
    .max(254, 'That email address is too long.')
    .regex(
      /^[^\s@<>"]+@[^\s@<>"]+\.[^\s@<>"]+$/,
      'That does not look like an email address: it needs a name, an @ and a domain.',
    );

type Shape = Readonly<Record<string, z.ZodType>>;
type Output<S extends Shape> = { [K in keyof S]: z.output<S[K]> };

/**
 * Reads a change: only the fields that were sent are checked and returned, so that a missing field means "as it is" and never
 * a default. Unknown fields are ignored; a body without any known field is refused.
 */
export function parsePatch<S extends Shape>(shape: S, raw: unknown): Partial<Output<S>> {
  const body = z.record(z.string(), z.unknown(), { error: 'Send the fields to change as an object.' }).parse(raw);
  const sent = Object.keys(shape).filter((name) => Object.hasOwn(body, name) && body[name] !== undefined);
  const some = z.custom<unknown>(() => sent.length > 0, `Nothing to change: send ${Object.keys(shape).join(', ')}.`);
  some.parse(raw);
  const present = Object.fromEntries(sent.map((name) => [name, shape[name] as z.ZodType]));
  return z.object(present).parse(body) as Partial<Output<S>>;
}
