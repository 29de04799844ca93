import type { Band, Forecast } from '@/lib/domain/types';
import { likelihoodPhrase, ZONES, zoneLabel, zoneOdds } from '@/lib/domain/words';
import { glue } from './glue';

/** The odds below, in and above the band: word, count and percent each time. What a miss tends to do stands beside its side. */
export function OddsList({ forecast, band }: { forecast: Forecast; band: Band }) {
  return (
    <dl className="odds">
      {ZONES.map((zone) => (
        <div className={`odds-line odds-${zone}`} key={zone}>
          <dt className={`key key-${zone}`}>{glue(zoneLabel(zone, band))}</dt>
          <dd>
            {glue(likelihoodPhrase(zoneOdds(forecast, zone)))}
            {SIDE_NOTE[zone] && <span className="odds-note">{SIDE_NOTE[zone]}</span>}
          </dd>
        </div>
      ))}
    </dl>
  );
}

// Common practice, no published source: too little slip shakes or bogs the car, too much smokes the tires.
const SIDE_NOTE = { below: 'Shake side.', band: '', above: 'Smoke side.' } as const;
