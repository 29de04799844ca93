import { type SubmitEvent, useRef, useState } from 'react';
import { addLabel, keepGoodLabel } from '@/components/passes/import-text';
import { PlanReport } from '@/components/passes/PlanReport';
import { Button } from '@/components/ui/react/Button';
import { Notice } from '@/components/ui/react/Notice';
import { Select } from '@/components/ui/react/Select';
import type { UnitSystem } from '@/lib/domain/display';
import type { ImportPlan } from '@/lib/server/passes';
import { ApiError, api } from '../api';

interface ImportFormProps {
  cars: readonly { id: string; name: string }[];
  carId: string;
  units: UnitSystem;
  /** What a post without script came to. */
  plan: ImportPlan | null;
  message: string | null;
}

interface State {
  plan: ImportPlan | null;
  message: string | null;
  busy: 'check' | 'add' | null;
}

/** Choose a file, see what it would do, then add it. With script the file is chosen once; without, a second time to add it. */
export function ImportForm({ cars, carId, units, plan, message }: ImportFormProps) {
  const [state, setState] = useState<State>({ plan, message, busy: null });
  const report = useRef<HTMLDivElement>(null);
  const check = async (form: HTMLFormElement) => {
    setState({ plan: null, message: null, busy: 'check' });
    const found = await ask<ImportPlan>(form, { dryRun: 'true' });
    setState({ ...found, busy: null });
    report.current?.focus();
  };
  const add = async (form: HTMLFormElement) => {
    setState({ ...state, message: null, busy: 'add' });
    const { plan: stored, message: refused } = await ask<ImportPlan>(form, {});
    if (stored) location.assign(addedAddress(form, stored));
    else setState({ ...state, message: refused, busy: null });
  };
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    if (state.busy) return;
    const wanted = event.nativeEvent.submitter?.getAttribute('value');
    void (wanted === 'add' ? add(event.currentTarget) : check(event.currentTarget));
  };
  return (
    <form method="post" encType="multipart/form-data" className="import-form" onSubmit={submit}>
      <div className="import-choose">
        {cars.length > 1 ? (
          <Select
            name="carId"
            label="Car"
            options={cars.map(({ id, name }) => ({ value: id, label: name }))}
            defaultValue={carId}
          />
        ) : (
          <input type="hidden" name="carId" value={carId} />
        )}
        <FileField
          asksAgain={state.plan !== null && plan === state.plan}
          onNew={() => setState({ plan: null, message: null, busy: null })}
        />
        <Button
          type="submit"
          name="step"
          value="check"
          kind={state.plan ? 'plain' : 'primary'}
          aria-disabled={state.busy !== null}
        >
          {state.busy === 'check' ? 'Reading…' : 'Check the file'}
        </Button>
      </div>
      {!state.plan && <Refused message={state.message} />}
      <div ref={report} tabIndex={-1} className="import-report">
        {state.plan && (
          <section className="slip" aria-labelledby="plan-title">
            <header className="slip-head">
              <h2 id="plan-title">What the file would do</h2>
              <span className="muted">nothing is stored yet</span>
            </header>
            <PlanReport plan={state.plan} units={units} />
            <Refused message={state.message} />
            <AddStep counts={state.plan.counts} busy={state.busy} />
          </section>
        )}
      </div>
    </form>
  );
}

function Refused({ message }: { message: string | null }) {
  if (!message) return null;
  return (
    <Notice kind="danger" title="Nothing was added">
      <p>{message}</p>
    </Notice>
  );
}

function FileField({ asksAgain, onNew }: { asksAgain: boolean; onNew: () => void }) {
  return (
    <div className="field">
      <label className="label" htmlFor="file">
        {asksAgain ? 'The same CSV file again' : 'CSV file'}
      </label>
      <input
        className="input"
        id="file"
        name="file"
        type="file"
        accept=".csv,text/csv,text/plain"
        required
        onChange={onNew}
      />
    </div>
  );
}

function AddStep({ counts, busy }: { counts: ImportPlan['counts']; busy: State['busy'] }) {
  if (counts.added === 0) return <p className="plan-end">There is nothing to add.</p>;
  return (
    <div className="form-actions plan-end">
      {counts.refused > 0 && (
        <label className="choice">
          <input type="checkbox" name="confirmPartial" value="true" />
          {keepGoodLabel(counts)}
        </label>
      )}
      <Button type="submit" name="step" value="add" kind="primary" aria-disabled={busy !== null}>
        {busy === 'add' ? 'Adding…' : addLabel(counts.added)}
      </Button>
    </div>
  );
}

async function ask<T>(
  form: HTMLFormElement,
  extra: Record<string, string>,
): Promise<{ plan: T | null; message: string | null }> {
  const body = new FormData(form);
  for (const [name, value] of Object.entries(extra)) body.set(name, value);
  try {
    return { plan: await api<T>('/api/passes/import', { body }), message: null };
  } catch (error) {
    return {
      plan: null,
      message: error instanceof ApiError ? error.message : 'The file could not be sent. Try again.',
    };
  }
}

function addedAddress(form: HTMLFormElement, { counts }: ImportPlan): string {
  const car = String(new FormData(form).get('carId'));
  return `/passes/import?${new URLSearchParams({ car, added: String(counts.added), there: String(counts.duplicates) })}`;
}
