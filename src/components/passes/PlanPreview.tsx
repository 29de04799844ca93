import type { UnitSystem } from '@/lib/domain/display';
import { formatValue, unitLabel } from '@/lib/domain/display';
import type { ImportPlan } from '@/lib/server/passes';
import { seconds, slipText } from './pass-text';

type Row = ImportPlan['added'][number];

/** The first rows as they were read, so that a wrong unit or column is seen before it is stored. */
export function PlanPreview({ plan, units }: { plan: ImportPlan; units: UnitSystem }) {
  const { added, counts } = plan;
  if (added.length === 0) return null;
  return (
    <details className="fold" open={added.length <= 5}>
      <summary>
        <span>As they were read</span>
        <span className="muted">
          {added.length < counts.added ? `the first ${added.length} of ${counts.added}` : `${added.length} rows`}
        </span>
      </summary>
      <div className="table-wrap">
        <table className="table preview">
          <thead>
            <tr>
              <th scope="col">Pass</th>
              <th scope="col">Run</th>
              <th scope="col">Event, round</th>
              <th scope="col" className="num">
                Air {unitLabel('airTemperature', units)}
              </th>
              <th scope="col" className="num">
                Track {unitLabel('trackTemperature', units)}
              </th>
              <th scope="col" className="num">
                Slip
              </th>
              <th scope="col" className="num">
                60 ft
              </th>
            </tr>
          </thead>
          <tbody>
            {added.map((row) => (
              <PreviewRow key={row.rowNumber} row={row} units={units} />
            ))}
          </tbody>
        </table>
      </div>
    </details>
  );
}

function PreviewRow({ row, units }: { row: Row; units: UnitSystem }) {
  return (
    <tr>
      <th scope="row">{row.passNo}</th>
      <td className="cell-when">{localTime(row)}</td>
      <td>{[row.event, row.round].filter(Boolean).join(', ')}</td>
      <td className="num">{formatValue('airTemperature', row.airTempC, units)}</td>
      <td className="num">{formatValue('trackTemperature', row.trackTempC, units)}</td>
      <td className="num">{slipText(row.slipPct)}</td>
      <td className="num">{seconds(row.sixtyFtS)}</td>
    </tr>
  );
}

// The wall clock of the file: its own offset, not a time zone that may still be a guess.
function localTime({ time, utcOffset }: Row): string {
  const [hours = 0, minutes = 0] = utcOffset === 'Z' ? [] : utcOffset.slice(1).split(':').map(Number);
  const offsetMs = (utcOffset.startsWith('-') ? -1 : 1) * (hours * 60 + minutes) * 60_000;
  return new Date(Date.parse(time) + offsetMs).toISOString().slice(0, 16).replace('T', ' ');
}
