import { type SettingSpec, settingInput } from '@/components/suggestion/settings';
import { limitText, stepped } from './stepping';

interface StepperFieldProps {
  spec: SettingSpec;
  name: string;
  text: string;
  onText: (text: string) => void;
  /** False until the page's script runs: then buttons that do nothing would only be in the way. */
  ready: boolean;
  error?: string | undefined;
  inputRef: (element: HTMLInputElement | null) => void;
}

/** A setting with one button for a step down and one for a step up. Typing is free; a value outside the limits is named. */
export function StepperField({ spec, name, text, onText, ready, error, inputRef }: StepperFieldProps) {
  const id = `s-${name.replaceAll('.', '-')}`;
  const limit = limitText(text, spec);
  const problem = error ?? (limit && `${spec.label} is ${limit}.`);
  return (
    <div className="field">
      <label className="label" htmlFor={id}>
        {spec.label}
        {spec.unit && <span className="visually-hidden"> ({spec.unit})</span>}
      </label>
      <p className="hint" id={`${id}-hint`}>
        Step {settingInput(spec.step, spec)}, limits {settingInput(spec.low, spec)} to {settingInput(spec.high, spec)}
      </p>
      <div className="stepper-row">
        {ready && <StepButton spec={spec} text={text} direction={-1} onText={onText} />}
        <div className="control">
          <input
            className="input"
            type="text"
            inputMode="decimal"
            autoComplete="off"
            id={id}
            name={name}
            ref={inputRef}
            value={text}
            onChange={(event) => onText(event.target.value)}
            aria-invalid={problem ? true : undefined}
            aria-describedby={problem ? `${id}-error ${id}-hint` : `${id}-hint`}
          />
          {spec.unit && (
            <span className="suffix" aria-hidden="true">
              {spec.unit}
            </span>
          )}
        </div>
        {ready && <StepButton spec={spec} text={text} direction={1} onText={onText} />}
      </div>
      {problem && (
        <p className="error" id={`${id}-error`}>
          {problem}
        </p>
      )}
    </div>
  );
}

interface StepButtonProps {
  spec: SettingSpec;
  text: string;
  direction: 1 | -1;
  onText: (text: string) => void;
}

function StepButton({ spec, text, direction, onText }: StepButtonProps) {
  const next = stepped(text, spec, direction);
  return (
    <button
      type="button"
      className="stepper-btn"
      disabled={next === null}
      onClick={() => next !== null && onText(next)}
      aria-label={`${spec.label} one step ${direction === 1 ? 'up' : 'down'}`}
    >
      {direction === 1 ? '+' : '\u2212'}
    </button>
  );
}
