import { clockAt, dayAt, etOf, LANE_LABEL, OUTCOME_LABEL, seconds, settingTexts } from '@/components/passes/pass-text';
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
      <Figure
        label="Track"
        unit={unitLabel('trackTemperature', units)}
        text={formatValue('trackTemperature', pass.conditions.trackTempC, units)}
      />
      <Figure
        label="Density alt."
        unit={unitLabel('altitude', units)}
        text={formatValue('altitude', pass.densityAltitudeM, units)}
      />
      <td className="cell-slip">
        <SlipMark slipPct={pass.slipPct} band={car.band} />
      </td>
      <td className="cell-outcome">
        {pass.outcome ? OUTCOME_LABEL[pass.outcome] : NO_VALUE}
        {pass.excluded && <span className="tag">left out</span>}
      </td>
      <Figure label="60 ft" unit="s" text={seconds(pass.sixtyFtS)} />
      <Figure label={et.label} unit="s" text={seconds(pass[et.field])} />
    </tr>
  );
}

/** A number of a row; on a phone it says its own name and unit. */
function Figure({ label, unit, text }: { label: string; unit: string; text: string }) {
  return (
    <td className="num" data-label={label} data-unit={text === NO_VALUE ? undefined : unit}>
      {text}
    </td>
  );
}
