import { index, integer, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { LANES, OUTCOMES } from '../../lib/domain/types';
import { car, discSet } from './car';
import { createdAt, flag, id, instant } from './columns';
import { team, user } from './team';

export const track = sqliteTable(
  'track',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    name: text('name').notNull(),
    latitudeDeg: real('latitude_deg'),
    longitudeDeg: real('longitude_deg'),
    altitudeM: real('altitude_m'),
    /** IANA zone, e.g. America/Denver. */
    timeZone: text('time_zone').notNull().default('UTC'),
    archivedAt: instant('archived_at'),
    createdAt: createdAt(),
  },
  (t) => [uniqueIndex('track_team_name').on(t.teamId, t.name)],
);

export const event = sqliteTable(
  'event',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    trackId: text('track_id')
      .notNull()
      .references(() => track.id),
    name: text('name').notNull(),
    /** Calendar dates at the track, yyyy-mm-dd. */
    startsOn: text('starts_on').notNull(),
    endsOn: text('ends_on').notNull(),
    createdAt: createdAt(),
  },
  (t) => [uniqueIndex('event_team_name_start').on(t.teamId, t.name, t.startsOn), index('event_track').on(t.trackId)],
);

export const round = sqliteTable(
  'round',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    eventId: text('event_id')
      .notNull()
      .references(() => event.id),
    name: text('name').notNull(),
    /** Order within the event, from 1. */
    position: integer('position').notNull(),
    lane: text('lane', { enum: LANES }),
    plannedAt: instant('planned_at'),
    createdAt: createdAt(),
  },
  (t) => [uniqueIndex('round_event_name').on(t.eventId, t.name), index('round_team').on(t.teamId)],
);

/**
 * A reading as it was entered, in SI. Humidity is what was read: exactly one of relative humidity, dew point or wet bulb.
 * `pressure_pa` is of `pressure_kind`; the station pressure of an altimeter setting is derived with `altitude_m`.
 * Append only: a correction is a new row whose `corrects_id` points at the old.
 */
export const reading = sqliteTable(
  'reading',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    trackId: text('track_id')
      .notNull()
      .references(() => track.id),
    roundId: text('round_id').references(() => round.id),
    takenAt: instant('taken_at').notNull(),
    airTempC: real('air_temp_c'),
    /** Fraction 0-1. */
    relativeHumidity: real('relative_humidity'),
    dewPointC: real('dew_point_c'),
    wetBulbC: real('wet_bulb_c'),
    pressurePa: real('pressure_pa'),
    pressureKind: text('pressure_kind', { enum: ['station', 'altimeter'] }),
    /** Altitude of the track when the reading was entered; used for an altimeter setting. */
    altitudeM: real('altitude_m'),
    trackTempC: real('track_temp_c'),
    trackTempPlace: text('track_temp_place').notNull().default(''),
    windMps: real('wind_mps'),
    /** Degrees from north the wind comes from. */
    windDirDeg: real('wind_dir_deg'),
    cloudPct: real('cloud_pct'),
    source: text('source', { enum: ['hand', 'file', 'service'] }).notNull(),
    enteredBy: text('entered_by').references(() => user.id),
    correctsId: text('corrects_id'),
    /** Made by the entering device, so that a repeated send adds nothing. */
    clientId: text('client_id'),
    createdAt: createdAt(),
  },
  (t) => [
    uniqueIndex('reading_team_client').on(t.teamId, t.clientId),
    uniqueIndex('reading_corrects').on(t.correctsId),
    index('reading_team_track_time').on(t.teamId, t.trackId, t.takenAt),
  ],
);

/**
 * One run down the strip. Append only: a correction, an exclusion or a restoration is a new row whose `corrects_id` points at
 * the row it replaces. `root_id` is the first row's id and names the pass everywhere; the newest row of a root is the pass.
 */
export const pass = sqliteTable(
  'pass',
  {
    id: id(),
    rootId: text('root_id').notNull(),
    correctsId: text('corrects_id'),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    carId: text('car_id')
      .notNull()
      .references(() => car.id),
    roundId: text('round_id')
      .notNull()
      .references(() => round.id),
    readingId: text('reading_id').references(() => reading.id),
    passNo: integer('pass_no').notNull(),
    runAt: instant('run_at').notNull(),
    lane: text('lane', { enum: LANES }),
    /** Value per adjustable key, in the adjustable's own unit. */
    settings: text('settings', { mode: 'json' }).$type<Record<string, number>>().notNull(),
    runsOnDiscs: integer('runs_on_discs'),
    discSetId: text('disc_set_id').references(() => discSet.id),
    /** Mean slip in the early window, percent against ground speed, and its known measurement error (one sd). */
    slipPct: real('slip_pct'),
    slipSdPct: real('slip_sd_pct'),
    slipSource: text('slip_source', { enum: ['measured', 'run_log'] }),
    sixtyFtS: real('sixty_ft_s'),
    threeThirtyFtS: real('three_thirty_ft_s'),
    eighthS: real('eighth_s'),
    eighthMps: real('eighth_mps'),
    thousandFtS: real('thousand_ft_s'),
    quarterS: real('quarter_s'),
    quarterMps: real('quarter_mps'),
    outcome: text('outcome', { enum: OUTCOMES }),
    excluded: flag('excluded').notNull().default(false),
    excludedReason: text('excluded_reason'),
    /** Why this row replaces the one before it. */
    correctionReason: text('correction_reason'),
    notes: text('notes').notNull().default(''),
    source: text('source', { enum: ['hand', 'file', 'service'] }).notNull(),
    enteredBy: text('entered_by').references(() => user.id),
    clientId: text('client_id'),
    createdAt: createdAt(),
  },
  (t) => [
    uniqueIndex('pass_corrects').on(t.correctsId),
    uniqueIndex('pass_team_client').on(t.teamId, t.clientId),
    index('pass_car_time').on(t.carId, t.runAt),
    index('pass_root').on(t.rootId),
    index('pass_team').on(t.teamId),
  ],
);

/** A recorded run: the file as uploaded (hashed, counted once), how its channels map, and what it was reduced to. */
export const runLog = sqliteTable(
  'run_log',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    carId: text('car_id')
      .notNull()
      .references(() => car.id),
    passRootId: text('pass_root_id'),
    sha256: text('sha256').notNull(),
    bytes: integer('bytes').notNull(),
    originalName: text('original_name').notNull(),
    channelMap: text('channel_map', { mode: 'json' }).$type<Record<string, unknown>>().notNull(),
    trace: text('trace', { mode: 'json' }).$type<Record<string, unknown>>(),
    reduction: text('reduction', { mode: 'json' }).$type<Record<string, unknown>>(),
    uploadedBy: text('uploaded_by').references(() => user.id),
    createdAt: createdAt(),
  },
  (t) => [uniqueIndex('run_log_team_hash').on(t.teamId, t.sha256), index('run_log_pass').on(t.passRootId)],
);
