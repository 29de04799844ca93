import type { InputHTMLAttributes } from 'react';
import { describedBy, fieldIds } from '../field';

interface FieldProps extends InputHTMLAttributes<HTMLInputElement> {
  name: string;
  label: string;
  hint?: string | undefined;
  error?: string | undefined;
  unit?: string | undefined;
  numeric?: boolean;
  idPrefix?: string;
}

/** React twin of Field.astro: same markup and classes. */
export function Field({ name, label, hint, error, unit, numeric = false, idPrefix, ...rest }: FieldProps) {
  const ids = fieldIds(name, idPrefix);
  const numberProps = numeric ? ({ inputMode: 'decimal', autoComplete: 'off' } as const) : {};
  const input = (
    <input
      className="input"
      type="text"
      {...numberProps}
      {...rest}
      id={ids.input}
      name={name}
      aria-invalid={error ? true : undefined}
      aria-describedby={describedBy(ids, { hint: Boolean(hint), error: Boolean(error) })}
    />
  );
  return (
    <div className="field">
      <label className="label" htmlFor={ids.input}>
        {label}
        {unit && <span className="visually-hidden"> ({unit})</span>}
      </label>
      {hint && (
        <p className="hint" id={ids.hint}>
          {hint}
        </p>
      )}
      {unit ? <Suffixed unit={unit}>{input}</Suffixed> : input}
      {error && (
        <p className="error" id={ids.error} role="alert">
          {error}
        </p>
      )}
    </div>
  );
}

function Suffixed({ unit, children }: { unit: string; children: React.ReactNode }) {
  return (
    <div className="control">
      {children}
      <span className="suffix" aria-hidden="true">
        {unit}
      </span>
    </div>
  );
}
