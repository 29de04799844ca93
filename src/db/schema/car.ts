import { index, integer, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { createdAt, flag, id, instant } from './columns';
import { team } from './team';

export const car = sqliteTable(
  'car',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    name: text('name').notNull(),
    carClass: text('car_class').notNull().default(''),
    distanceFt: integer('distance_ft').notNull().default(1000),
    /** Driveshaft turns per wheel turn. */
    finalDriveRatio: real('final_drive_ratio'),
    /** Driven tyre circumference at rest, m, and its relative growth per m/s of wheel speed. */
    rolloutM: real('rollout_m'),
    rolloutGrowthPerMps: real('rollout_growth_per_mps'),
    frontRolloutM: real('front_rollout_m'),
    pulsesPerTurn: integer('pulses_per_turn'),
    /** Target slip range, percent against ground speed. */
    bandLowPct: real('band_low_pct').notNull().default(13),
    bandHighPct: real('band_high_pct').notNull().default(17),
    slipWindowStartS: real('slip_window_start_s').notNull().default(0.5),
    slipWindowEndS: real('slip_window_end_s').notNull().default(2.5),
    sensorNote: text('sensor_note').notNull().default(''),
    archivedAt: instant('archived_at'),
    createdAt: createdAt(),
  },
  (t) => [uniqueIndex('car_team_name').on(t.teamId, t.name)],
);

export const adjustable = sqliteTable(
  'adjustable',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    carId: text('car_id')
      .notNull()
      .references(() => car.id),
    /** Column name in a pass CSV, e.g. counterweight_g. */
    key: text('key').notNull(),
    label: text('label').notNull(),
    unit: text('unit').notNull().default(''),
    step: real('step').notNull(),
    low: real('low').notNull(),
    high: real('high').notNull(),
    minutes: real('minutes').notNull(),
    group: text('adjustable_group', { enum: ['clutch', 'launch'] }).notNull(),
    movable: flag('movable').notNull().default(true),
    /** Belief: one step up changes slip by mean +- sd points. Both null when left open. */
    beliefMeanPct: real('belief_mean_pct'),
    beliefSdPct: real('belief_sd_pct'),
    position: integer('position').notNull().default(0),
    archivedAt: instant('archived_at'),
    createdAt: createdAt(),
  },
  (t) => [uniqueIndex('adjustable_car_key').on(t.carId, t.key), index('adjustable_team').on(t.teamId)],
);

/** A numbered set of discs; runs are counted from the passes made on it. */
export const discSet = sqliteTable(
  'disc_set',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    carId: text('car_id')
      .notNull()
      .references(() => car.id),
    name: text('name').notNull(),
    discCount: integer('disc_count'),
    notes: text('notes').notNull().default(''),
    retiredAt: instant('retired_at'),
    createdAt: createdAt(),
  },
  (t) => [uniqueIndex('disc_set_car_name').on(t.carId, t.name), index('disc_set_team').on(t.teamId)],
);
