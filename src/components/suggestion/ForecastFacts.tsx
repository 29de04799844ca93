import type { Band, Forecast } from '@/lib/domain/types';
import { type Intervals, medianOf } from '@/lib/domain/words';
import type { Call } from './call';
import { Dotplot } from './Dotplot';
import type { SlipScale } from './dotplot';
import { IntervalList } from './IntervalList';
import { OddsList } from './OddsList';

/** A forecast is never shown without its intervals, the passes it rests on and whose call it is: all are required. */
export interface ForecastFactsProps {
  forecast: Forecast;
  band: Band;
  scale: SlipScale;
  intervals: Intervals;
  passesUsed: number;
  call: Call;
}

export function ForecastFacts({ forecast, band, scale, intervals, passesUsed, call }: ForecastFactsProps) {
  return (
    <div className="forecast-box">
      <div className="forecast">
        <Dotplot forecast={forecast} band={band} scale={scale} />
        <div>
          <OddsList forecast={forecast} band={band} />
          <IntervalList intervals={intervals} medianPct={medianOf(forecast)} />
        </div>
      </div>
      <p className="forecast-basis">
        From {passesUsed} {passesUsed === 1 ? 'pass' : 'passes'} of your own. {call.text}
      </p>
    </div>
  );
}
