import { errorText } from '@/components/islands/query';
import type { Call } from '@/components/suggestion/call';
import { sharedScale } from '@/components/suggestion/dotplot';
import { ForecastFacts } from '@/components/suggestion/ForecastFacts';
import { glue } from '@/components/suggestion/glue';
import { Notice } from '@/components/ui/react/Notice';
import type { Band, Forecast } from '@/lib/domain/types';
import { intervalsOf, likelihoodPhrase, percentText } from '@/lib/domain/words';
import type { AskedForecast } from './useForecast';

interface LiveForecastProps {
  asked: AskedForecast;
  band: Band;
  /** The forecasts the page shows already: the live one is drawn on an axis that holds them too. */
  beside: readonly Forecast[];
  passesUsed: number;
  call: Call;
  minutes: string;
}

/** The odds for settings moved by hand, as full as those of an offer. */
export function LiveForecast({ asked, band, beside, passesUsed, call, minutes }: LiveForecastProps) {
  const { answer, error, busy } = asked;
  if (error)
    return (
      <Notice kind="danger" title="No live forecast">
        {errorText(error)}
      </Notice>
    );
  if (!answer) return <p className="muted">Working out the odds for these settings.</p>;
  if (!answer.forecast)
    return <Notice title="No forecast">There are too few passes to forecast these settings.</Notice>;
  return (
    <section className="live" data-busy={busy} aria-label="Forecast for your settings">
      <div className="live-head">
        <h3>Forecast for your settings</h3>
        <span className="num">{minutes}</span>
      </div>
      <ForecastFacts
        forecast={answer.forecast}
        band={band}
        scale={sharedScale([...beside, answer.forecast], band)}
        intervals={intervalsOf(answer.forecast)}
        passesUsed={passesUsed}
        call={call}
      />
      {answer.warnings.map((warning) => (
        <Notice kind="warn" key={warning}>
          {warning}
        </Notice>
      ))}
      {!answer.asSuggested && (
        <Notice kind="warn" title="Not the same passes">
          Passes have changed since this suggestion was made; this forecast may not match the offers above.
        </Notice>
      )}
    </section>
  );
}

/** One line that stays in sight on a phone while the settings move, and is read out when it has settled. */
export function LiveSummary({ asked }: { asked: AskedForecast }) {
  const forecast = asked.answer?.forecast;
  const { pInBand, pBelow, pAbove } = forecast ?? { pInBand: 0, pBelow: 0, pAbove: 0 };
  return (
    <div className="live-sum" role="status" data-busy={asked.busy}>
      {forecast && !asked.busy && (
        <p>
          <strong>{glue(`In the band: ${likelihoodPhrase(pInBand)}`)}</strong>{' '}
          {glue(`below ${percentText(pBelow)}, above ${percentText(pAbove)}`)}
        </p>
      )}
      {asked.busy && <p>Working out the odds.</p>}
    </div>
  );
}
