import { formatQuantity, NO_VALUE, type UnitSystem } from '@/lib/domain/display';
import type { ImportPlan } from '@/lib/server/passes';
import { planSummary } from './import-text';
import { PlanPreview } from './PlanPreview';

/** What importing a file would do, before anything is stored. */
export function PlanReport({ plan, units }: { plan: ImportPlan; units: UnitSystem }) {
  const { counts, unknownColumns, missingColumns, notes } = plan;
  return (
    <div className="plan-report">
      <p className="plan-summary">
        {planSummary(counts).map((sentence) => (
          <span key={sentence}>{sentence} </span>
        ))}
      </p>
      <Refusals plan={plan} />
      <NewPlaces plan={plan} units={units} />
      {notes.length > 0 && <Listed title="How the file was understood" items={notes} />}
      {counts.withoutSlip > 0 && (
        <p>
          Passes without slip: {counts.withoutSlip}. They are kept in the log, but only a measured slip teaches the
          model.
        </p>
      )}
      <Names title="Columns that are not known and were ignored" names={unknownColumns} />
      <Names title="Columns the file does not have" names={missingColumns} />
      <PlanPreview plan={plan} units={units} />
    </div>
  );
}

function Refusals({ plan: { counts, refused } }: { plan: ImportPlan }) {
  if (refused.length === 0) return null;
  return (
    <section>
      <h3>Refused rows</h3>
      <table className="table refusals">
        <thead>
          <tr>
            <th scope="col">Row</th>
            <th scope="col">Column</th>
            <th scope="col">Why</th>
          </tr>
        </thead>
        <tbody>
          {refused.map(({ row, column, reason }) => (
            <tr key={`${row} ${column} ${reason}`}>
              <td>{row}</td>
              <td>{column ?? 'whole row'}</td>
              <td>{reason}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {counts.refused > refused.length && <p className="muted">More are refused; these are the first.</p>}
    </section>
  );
}

function NewPlaces({ plan: { newTracks, newEvents, newRounds }, units }: { plan: ImportPlan; units: UnitSystem }) {
  if (newTracks.length + newEvents.length + newRounds.length === 0) return null;
  const tracks = newTracks.map(({ name, altitudeM, timeZone }) => {
    const altitude = altitudeM === null ? 'no altitude' : formatQuantity('altitude', altitudeM, units);
    return `Track ${name} (${altitude}, ${timeZone.replaceAll('_', ' ')})`;
  });
  const events = newEvents.map(({ name, track, startsOn, endsOn }) => {
    const days = startsOn === endsOn ? startsOn : `${startsOn} to ${endsOn}`;
    return `Event ${name} at ${track || NO_VALUE}, ${days}`;
  });
  const rounds = newRounds.length > 0 ? [`Rounds of these events: ${newRounds.length}`] : [];
  return <Listed title="New in your team" items={[...tracks, ...events, ...rounds]} />;
}

function Listed({ title, items }: { title: string; items: readonly string[] }) {
  return (
    <section>
      <h3>{title}</h3>
      <ul>
        {items.map((item) => (
          <li key={item}>{item}</li>
        ))}
      </ul>
    </section>
  );
}

function Names({ title, names }: { title: string; names: readonly string[] }) {
  if (names.length === 0) return null;
  return (
    <p>
      {title}: {names.join(', ')}.
    </p>
  );
}
