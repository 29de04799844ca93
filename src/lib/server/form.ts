/**
 * Plain HTML form pages: the page posts to itself, works without script, and loses nothing on a refusal.
 *
 * @example in the frontmatter of src/pages/tracks/new.astro
 *   const form = await handleForm(Astro, {
 *     run: (ctx, raw) => createTrack(ctx, raw),       // any verb: (ctx, raw) => Promise<T>
 *     done: (track) => `/tracks/${track.id}`,          // 303 to here on success
 *     initial: { timeZone: 'America/Denver' },         // what the inputs show before anything is typed
 *   });
 *   if (form.response) return form.response;
 *
 *   <form method="post">
 *     {form.message && <p role="alert">{form.message}</p>}
 *     <input name="name" value={form.values.name} aria-invalid={form.errors.name ? true : undefined} />
 *     {form.errors.name && <p id="name-error">{form.errors.name}</p>}
 *
 * Several forms on one page: give each `name: 'belief'` and a hidden `<input name="_form" value="belief">`; all of them must
 * be handled, and only the one posted runs. A dotted name (`settings.counterweight_g`) becomes a nested object for the verb;
 * its value and its error keep the dotted name. A repeated name keeps its last value, so a checkbox is
 * `<input type="hidden" name="movable" value="false"><input type="checkbox" name="movable" value="true">`.
 * Files arrive in `raw` as File (raise `limitBytes`); they and passwords are never refilled.
 */
import type { AstroGlobal } from 'astro';
import type { ServerContext } from './context';
import { validationError } from './errors';
import { readBody, shownError } from './http';
import { contextFromLocals } from './locals';

export type FormPage = Pick<AstroGlobal, 'request' | 'locals' | 'response' | 'redirect'>;
/** What a verb gets: strings (or Files), nested where a name was dotted. */
export type RawForm = Record<string, unknown>;

export interface FormState {
  /** Set when the post succeeded: return it from the page. */
  response: Response | null;
  /** By input name; an unknown name is undefined, which leaves the attribute out. */
  values: Record<string, string>;
  errors: Record<string, string>;
  /** One sentence for the top of the form; null when nothing is wrong. */
  message: string | null;
}

interface FormOptions<T> {
  done: (result: T) => string;
  initial?: Record<string, unknown>;
  name?: string;
  limitBytes?: number;
}

export interface TeamForm<T> extends FormOptions<T> {
  run: (ctx: ServerContext, raw: RawForm) => Promise<T>;
}

export interface OpenForm<T> extends FormOptions<T> {
  run: (raw: RawForm) => Promise<T>;
}

const FORM_LIMIT_BYTES = 64 * 1024;

/** A form for signed-in members: builds the context of the verb and runs it. */
export function handleForm<T>(page: FormPage, spec: TeamForm<T>): Promise<FormState> {
  return handleOpenForm(page, { ...spec, run: (raw) => spec.run(contextFromLocals(page.locals), raw) });
}

/** A form that needs nobody signed in (sign-in, sign-up). */
export async function handleOpenForm<T>(page: FormPage, spec: OpenForm<T>): Promise<FormState> {
  if (page.request.method !== 'POST') return untouched(spec);
  let values: Record<string, string> = {};
  try {
    const data = await formData(page.request, spec.limitBytes ?? FORM_LIMIT_BYTES);
    if (spec.name && data.get('_form') !== spec.name) return untouched(spec);
    values = refillValues(data);
    const result = await spec.run(nested(data));
    return { response: page.redirect(spec.done(result), 303), values, errors: {}, message: null };
  } catch (error) {
    const shown = shownError(error, page.locals.requestId);
    page.response.status = shown.status;
    return { response: null, values, errors: { ...shown.fields }, message: shown.message };
  }
}

function untouched(spec: { initial?: Record<string, unknown> }): FormState {
  const values: Record<string, string> = {};
  for (const [name, value] of Object.entries(spec.initial ?? {})) values[name] = value == null ? '' : String(value);
  return { response: null, values, errors: {}, message: null };
}

// A body can be read once, but a page may hold several forms: the parsed form is kept with its request.
const parsed = new WeakMap<Request, Promise<FormData>>();

/** Reads a urlencoded or multipart body within the limit. Throws VALIDATION or TOO_LARGE. */
export function formData(request: Request, limitBytes: number): Promise<FormData> {
  const known = parsed.get(request);
  if (known) return known;
  const reading = readFormData(request, limitBytes);
  parsed.set(request, reading);
  return reading;
}

async function readFormData(request: Request, limitBytes: number): Promise<FormData> {
  const bytes = await readBody(request, limitBytes);
  const contentType = request.headers.get('content-type') ?? '';
  try {
    return await new Response(bytes, { headers: { 'content-type': contentType } }).formData();
  } catch {
    throw validationError('The form could not be read. Send it as an HTML form does.');
  }
}

function refillValues(data: FormData): Record<string, string> {
  const values: Record<string, string> = {};
  for (const [name, value] of data) {
    if (typeof value === 'string' && !/password/i.test(name)) values[name] = value;
  }
  return values;
}

const UNSAFE_NAMES = new Set(['__proto__', 'constructor', 'prototype', '_form']);

function nested(data: FormData): RawForm {
  const raw: RawForm = {};
  for (const [name, value] of data) {
    const path = name.split('.');
    if (path.some((part) => UNSAFE_NAMES.has(part))) continue;
    setPath(raw, path, value);
  }
  return raw;
}

function setPath(target: RawForm, path: readonly string[], value: unknown): void {
  const [head = '', ...rest] = path;
  if (rest.length === 0) {
    target[head] = value;
    return;
  }
  const inner = target[head];
  const next: RawForm =
    typeof inner === 'object' && inner !== null && !(inner instanceof File) ? (inner as RawForm) : {};
  target[head] = next;
  setPath(next, rest, value);
}
