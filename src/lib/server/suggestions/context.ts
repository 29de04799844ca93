import { conditionsFromReading } from '@/lib/domain/air/conditions';
import type { RunContext } from '@/lib/domain/types';
import type { SuggestionInput } from '@/lib/forms/suggestion';
import type { ServerContext } from '../context';
import { validationError } from '../errors';
import { teamRound } from '../lookup';
import { eventLabel } from '../passes';
import { standingReading } from '../readings';

type Asked = Pick<SuggestionInput, 'roundId' | 'readingId' | 'runsOnDiscs'>;

/**
 * The circumstances of a run from its round and reading. A reading that was corrected stands for its correction. The run is at the
 * planned time, or when the reading was taken. Throws NOT_FOUND, or VALIDATION when the reading is from another track.
 */
export async function runContext(
  ctx: ServerContext,
  asked: Asked,
): Promise<{ context: RunContext; readingId: string }> {
  const { round, event, track } = await teamRound(ctx, asked.roundId);
  const reading = await standingReading(ctx, asked.readingId);
  if (reading.trackId !== track.id) throw otherTrack(track.name);
  const context = {
    event: eventLabel(event),
    track: track.name,
    time: round.plannedAt ?? reading.takenAt,
    round: round.name,
    lane: round.lane,
    conditions: conditionsFromReading(reading),
    runsOnDiscs: asked.runsOnDiscs,
  };
  return { context, readingId: reading.id };
}

function otherTrack(trackName: string) {
  const message = `That reading was not taken at ${trackName}, where the round is. Choose or enter a reading of that track.`;
  return validationError(message, { readingId: message });
}
