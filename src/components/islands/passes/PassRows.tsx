import {
  clockAt,
  dayAt,
  densityAltitude,
  etOf,
  LANE_LABEL,
  OUTCOME_LABEL,
  seconds,
  settingTexts,
} from '@/components/passes/pass-text';
import { SlipMark } from '@/components/passes/SlipMark';
import type { TableCar } from '@/components/passes/table-data';
import { formatValue, NO_VALUE, type UnitSystem, unitLabel } from '@/lib/domain/display';
import type { PassView } from '@/lib/server/passes';

interface PassRowsProps {
  passes: readonly PassView[];
  car: TableCar;
  units: UnitSystem;
  withSettings: boolean;
}

/** One body a pass, so that its settings can stand under it; on a phone each body is a card laid out by passes.css. */
export function PassRows({ passes, ...rest }: PassRowsProps) {
  return passes.map((pass) => (
    <tbody key={pass.rootId} className={pass.excluded ? 'is-left-out' : undefined}>
      <PassRow pass={pass} {...rest} />
      {rest.withSettings && <SettingsRow pass={pass} car={rest.car} />}
    </tbody>
  ));
}

const COLUMNS = 11;

function SettingsRow({ pass, car }: { pass: PassView; car: TableCar }) {
  return (
    <tr className="settings-row">
      <td colSpan={COLUMNS}>{settingTexts(pass.settings, car.settings).join(' · ') || 'No settings recorded'}</td>
    </tr>
  );
}

function PassRow({ pass, car, units }: Omit<PassRowsProps, 'passes'> & { pass: PassView }) {
  const et = etOf(car.distanceFt);
  return (
    <tr className="pass-row">
      <th scope="row" className="cell-no">
        <a href={`/passes/${pass.rootId}`}>
          <span className="pass-hash">Pass </span>
          {pass.passNo}
        </a>
      </th>
      <td className="cell-when">
        {dayAt(pass.runAt, pass.timeZone)}
        <span className="sub">{clockAt(pass.runAt, pass.timeZone)}</span>
      </td>
      <td className="cell-event">
        {pass.eventName}
        <span className="sub">{pass.trackName}</span>
      </td>
      <td className="cell-round">{pass.roundName}</td>
      <td className="cell-lane">{pass.lane ? LANE_LABEL[pass.lane] : NO_VALUE}</td>
      <td className="num" data-label="Track" data-unit={unitLabel('trackTemperature', units)}>
        {formatValue('trackTemperature', pass.conditions.trackTempC, units)}
      </td>
      <td className="num" data-label="Density alt." data-unit={unitLabel('altitude', units)}>
        {densityAltitude(pass, units)}
      </td>
      <td className="cell-slip">
        <SlipMark slipPct={pass.slipPct} band={car.band} />
      </td>
      <td className="cell-outcome">
        {pass.outcome ? OUTCOME_LABEL[pass.outcome] : NO_VALUE}
        {pass.excluded && <span className="tag">left out</span>}
      </td>
      <td className="num" data-label="60 ft" data-unit="s">
        {seconds(pass.sixtyFtS)}
      </td>
      <td className="num" data-label={et.label} data-unit="s">
        {seconds(pass[et.field])}
      </td>
    </tr>
  );
}
