import { type Intervals, intervalName, intervalText, slipText } from '@/lib/domain/words';

interface IntervalListProps {
  intervals: Intervals;
  medianPct: number;
}

/** The 50, 80 and 95 % intervals as lines of a slip, with the middle. */
export function IntervalList({ intervals, medianPct }: IntervalListProps) {
  return (
    <dl className="slip-lines intervals">
      <div className="slip-line">
        <dt>Middle</dt>
        <dd>{slipText(medianPct)}</dd>
      </div>
      {intervals.map((interval) => (
        <div className="slip-line" key={interval.share}>
          <dt>
            {intervalName(interval)} <span className="intervals-share">({interval.share * 100} %)</span>
          </dt>
          <dd>{intervalText(interval)}</dd>
        </div>
      ))}
    </dl>
  );
}
