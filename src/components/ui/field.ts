export interface FieldIds {
  input: string;
  hint: string;
  error: string;
}

/** Ids that tie a control to its hint and error. `prefix` keeps two forms on one page apart. */
export function fieldIds(name: string, prefix = 'f'): FieldIds {
  const base = `${prefix}-${name.replaceAll('.', '-')}`;
  return { input: base, hint: `${base}-hint`, error: `${base}-error` };
}

/** The value for aria-describedby: error first, so it is read first; undefined when there is nothing to describe. */
export function describedBy(ids: FieldIds, has: { hint: boolean; error: boolean }): string | undefined {
  const parts = [has.error ? ids.error : '', has.hint ? ids.hint : ''].filter(Boolean);
  return parts.length > 0 ? parts.join(' ') : undefined;
}
