import { useId, useMemo, useState } from 'react';
import { Providers } from '@/components/islands/query';
import type { Call } from '@/components/suggestion/call';
import { minutesLine, type SettingSpec } from '@/components/suggestion/settings';
import { Button } from '@/components/ui/react/Button';
import type { Band, Forecast, Settings } from '@/lib/domain/types';
import { LiveForecast, LiveSummary } from './LiveForecast';
import { StepperField } from './StepperField';
import { minutesBetween, settingsOf, type Typed, typedOf } from './stepping';
import { useForecast } from './useForecast';
import { useTyped } from './useTyped';

export interface StartingPoint {
  label: string;
  settings: Settings;
  /** Position of the offer; null for the car as it stands when nothing is offered. */
  offerIndex: number | null;
}

export interface AdjustPanelProps {
  suggestionId: string;
  specs: readonly SettingSpec[];
  current: Settings;
  minutesLeft: number | null;
  starts: readonly StartingPoint[];
  initial: Typed;
  initialFrom: number | null;
  errors: Readonly<Record<string, string>>;
  band: Band;
  beside: readonly Forecast[];
  passesUsed: number;
  call: Call;
  /** Whether a forecast can be asked for at all. */
  live: boolean;
}

/** Settings moved by hand, with the forecast following. Part of the decision form: its inputs are posted with it. */
export function AdjustPanel(props: AdjustPanelProps) {
  return (
    <Providers>
      <Panel {...props} />
    </Providers>
  );
}

function Panel(props: AdjustPanelProps) {
  const { specs, initial, errors, starts, current, minutesLeft } = props;
  const { typed, setTyped, setOne, ready, refFor } = useTyped(initial, specs);
  const [from, setFrom] = useState(props.initialFrom);
  const settings = useMemo(() => settingsOf(typed, specs), [typed, specs]);
  const start = (point: StartingPoint) => {
    setTyped(typedOf(point.settings, specs));
    setFrom(point.offerIndex);
  };
  const asked = useForecast(props.suggestionId, settings, ready && props.live);
  return (
    <div className="adjust-panel">
      <input type="hidden" name="adjustFrom" value={from ?? ''} readOnly />
      {ready && <Starts starts={starts} chosen={from} onStart={start} />}
      {ready && props.live && <LiveSummary asked={asked} />}
      <div className="adjust-cols">
        <div className="steppers">
          {specs.map((spec) => (
            <StepperField
              key={spec.key}
              spec={spec}
              name={`finalSettings.${spec.key}`}
              text={typed[spec.key] ?? ''}
              onText={(text) => setOne(spec.key, text)}
              ready={ready}
              error={errors[`finalSettings.${spec.key}`]}
              inputRef={refFor(spec.key)}
            />
          ))}
        </div>
        {ready && props.live && settings && (
          <LiveForecast
            asked={asked}
            band={props.band}
            beside={props.beside}
            passesUsed={props.passesUsed}
            call={props.call}
            minutes={minutesLine(minutesBetween(current, settings, specs), minutesLeft)}
          />
        )}
      </div>
    </div>
  );
}

interface StartsProps {
  starts: readonly StartingPoint[];
  chosen: number | null;
  onStart: (point: StartingPoint) => void;
}

function Starts({ starts, chosen, onStart }: StartsProps) {
  const id = useId();
  return (
    <div>
      <p className="label" id={id}>
        Start from
      </p>
      {/* biome-ignore lint/a11y/useSemanticElements: a fieldset inside the fieldset of the form would be read twice */}
      <div className="from-row" role="group" aria-labelledby={id}>
        {starts.map((point) => (
          <Button
            kind="quiet"
            key={point.label}
            aria-pressed={point.offerIndex === chosen}
            onClick={() => onStart(point)}
          >
            {point.label}
          </Button>
        ))}
      </div>
    </div>
  );
}
