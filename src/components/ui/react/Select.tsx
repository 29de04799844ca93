import type { SelectHTMLAttributes } from 'react';
import { describedBy, fieldIds } from '../field';

interface SelectProps extends SelectHTMLAttributes<HTMLSelectElement> {
  name: string;
  label: string;
  options: readonly { value: string; label: string }[];
  empty?: string;
  hint?: string | undefined;
  error?: string | undefined;
  idPrefix?: string;
}

/** React twin of Select.astro. */
export function Select({ name, label, options, empty, hint, error, idPrefix, ...rest }: SelectProps) {
  const ids = fieldIds(name, idPrefix);
  return (
    <div className="field">
      <label className="label" htmlFor={ids.input}>
        {label}
      </label>
      {hint && (
        <p className="hint" id={ids.hint}>
          {hint}
        </p>
      )}
      <select
        className="select"
        {...rest}
        id={ids.input}
        name={name}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(ids, { hint: Boolean(hint), error: Boolean(error) })}
      >
        {empty !== undefined && <option value="">{empty}</option>}
        {options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
      {error && (
        <p className="error" id={ids.error} role="alert">
          {error}
        </p>
      )}
    </div>
  );
}
