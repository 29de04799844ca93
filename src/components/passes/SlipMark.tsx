import type { Band } from '@/lib/domain/types';
import { PLACE_WORD, type SlipPlace, slipPlace, slipText } from './pass-text';

/** Slip with where it lies: a shape and a word, never colour alone. Drawn by the server too. */
export function SlipMark({ slipPct, band }: { slipPct: number | null; band: Band }) {
  const place = slipPlace(slipPct, band);
  return (
    <span className="slip-mark">
      <strong className="num">{slipText(slipPct)}</strong>
      {place && (
        <span className="slip-place">
          <Shape place={place} />
          {PLACE_WORD[place]}
        </span>
      )}
    </span>
  );
}

const POINTS: Record<SlipPlace, string> = {
  below: '2,4 14,4 8,14',
  band: '2,3 14,3 14,13 2,13',
  above: '2,13 14,13 8,3',
};

function Shape({ place }: { place: SlipPlace }) {
  return (
    <svg viewBox="0 0 16 17" width="16" height="17" aria-hidden="true" focusable="false">
      <polygon className={`dot-${place}`} points={POINTS[place]} />
    </svg>
  );
}
