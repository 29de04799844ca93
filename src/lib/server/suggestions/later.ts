import { and, desc, eq, isNotNull, isNull, lte } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import { reading, type suggestion, track } from '@/db/schema';
import { roundOfContext } from '@/lib/domain/model/features';
import { forecastLater } from '@/lib/domain/model/later-run';
import { type TrackReading, type TrackTempForecast, trackTempAt } from '@/lib/domain/model/track-temperature';
import { preparePasses, trainModel } from '@/lib/domain/model/train';
import type { Forecast } from '@/lib/domain/types';
import { requireCan, type ServerContext } from '../context';
import { type TrackRow, teamReading, teamRound } from '../lookup';
import { loadPassRecords } from '../passes';
import { suggestionRow } from './view';

/** What the track may do until the planned time, and the forecast as the car stands when that is allowed for. */
export interface LaterRun {
  /** UTC instants. */
  readAt: string;
  plannedAt: string;
  trackTempC: number;
  track: TrackTempForecast;
  forecast: Forecast;
}

/** Up to here a reading stands for the run itself. */
const SOON_MS = 20 * 60_000;
/** Beyond a day the weather of that day is another matter. */
const A_DAY_MS = 24 * 3_600_000;
const MOST_READINGS = 80;

type SuggestionRow = typeof suggestion.$inferSelect;

/**
 * The forecast of a suggestion carried to the planned time of its round. Null when the run is soon after the reading, past, more than a
 * day off or not planned, or when track temperature, the position of the track or the model is missing. Throws NOT_FOUND.
 */
export async function laterRun(ctx: ServerContext, suggestionId: string): Promise<LaterRun | null> {
  requireCan(ctx, 'suggestion:view');
  const made = await suggestionRow(ctx, suggestionId);
  const { round, track: place } = await teamRound(ctx, made.roundId);
  const { takenAt, trackTempC } = await teamReading(ctx, made.readingId);
  const { plannedAt } = round;
  if (!made.result.noChange || trackTempC === null || !isLater(takenAt, plannedAt, ctx.now())) return null;
  const later = await trackThen(ctx, place, plannedAt, takenAt);
  const forecast = later && (await forecastThen(ctx, made, later));
  return forecast && { readAt: takenAt, plannedAt, trackTempC, track: later, forecast };
}

function isLater(takenAt: string, plannedAt: string | null, now: Date): plannedAt is string {
  if (plannedAt === null || Date.parse(plannedAt) <= now.getTime()) return false;
  const ahead = Date.parse(plannedAt) - Date.parse(takenAt);
  return ahead > SOON_MS && ahead <= A_DAY_MS;
}

async function trackThen(
  ctx: ServerContext,
  { id, latitudeDeg, longitudeDeg }: TrackRow,
  plannedAt: string,
  knownUntil: string,
): Promise<TrackTempForecast | null> {
  const question = { track: id, time: plannedAt, latitudeDeg, longitudeDeg, cloud: null };
  return trackTempAt(question, await trackReadings(ctx, knownUntil));
}

/** The team's standing readings up to an instant, anywhere: that of the suggestion is the newest. */
async function trackReadings(ctx: ServerContext, until: string): Promise<TrackReading[]> {
  const successor = alias(reading, 'successor');
  const rows = await ctx.db
    .select({ reading, track })
    .from(reading)
    .innerJoin(track, eq(track.id, reading.trackId))
    .leftJoin(successor, eq(successor.correctsId, reading.id))
    .where(
      and(
        eq(reading.teamId, ctx.team.id),
        lte(reading.takenAt, until),
        isNotNull(reading.trackTempC),
        isNull(successor.id),
      ),
    )
    .orderBy(desc(reading.takenAt), desc(reading.createdAt))
    .limit(MOST_READINGS);
  return rows.map(({ reading: row, track: place }) => ({
    track: place.id,
    time: row.takenAt,
    airTempC: row.airTempC,
    trackTempC: row.trackTempC,
    cloud: row.cloudPct === null ? null : row.cloudPct / 100,
    latitudeDeg: place.latitudeDeg,
    longitudeDeg: place.longitudeDeg,
  }));
}

async function forecastThen(
  ctx: ServerContext,
  made: SuggestionRow,
  later: TrackTempForecast,
): Promise<Forecast | null> {
  const { context, current, adjustables } = made.inputs;
  const prepared = preparePasses(await loadPassRecords(ctx, made.carId, made.createdAt));
  const model = trainModel(prepared, adjustables, made.result.band);
  const ordered = prepared.map(({ pass }) => pass);
  const run = { context, settings: current, roundInEvent: roundOfContext(ordered, context) };
  return model && forecastLater(model, run, later);
}
