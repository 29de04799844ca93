import { and, eq } from 'drizzle-orm';
import type { Db } from '@/db/client';
import { event, pass, round, track } from '@/db/schema';
import type { ParsedPassFile, PassCsvRow, Refusal } from '@/lib/pass-csv';
import type { ServerContext } from '../../context';
import { importNotes } from './notes';
import { type KnownPlaces, Places } from './places';
import { type NewRun, newRun } from './rows';

const PREVIEW_ROWS = 25;
const SHOWN_REFUSALS = 500;

/** What an import would do, or did. SI; settings in each adjustable's own unit. */
export interface ImportPlan {
  counts: { rows: number; added: number; refused: number; duplicates: number; withoutSlip: number };
  /** The first rows that would be added, in the order they were run. */
  added: PassCsvRow[];
  /** The first refusals; a row with several faults has several. */
  refused: Refusal[];
  unknownColumns: string[];
  missingColumns: string[];
  newTracks: { name: string; altitudeM: number | null; timeZone: string }[];
  newEvents: { name: string; track: string; startsOn: string; endsOn: string }[];
  newRounds: { name: string; event: string }[];
  /** Plain sentences: how the file was understood and what to check. */
  notes: string[];
}

/** The plan with the rows that carry it out. */
export interface PreparedImport {
  plan: ImportPlan;
  places: Places;
  runs: NewRun[];
}

/** Compares a file with what the team has. Reads, never writes. */
export async function prepareImport(
  ctx: ServerContext,
  db: Db,
  carId: string,
  file: ParsedPassFile,
): Promise<PreparedImport> {
  const known = await knownPlaces(ctx, db);
  const seen = await knownRuns(ctx, db, carId);
  const fresh = file.rows.filter((row) => !seen.has(runKey(row.passNo, row.time))).sort(inRunOrder);
  const createdAt = ctx.now().toISOString();
  const places = new Places(ctx.team.id, createdAt, known);
  const resolved = places.resolve(fresh);
  const runs = fresh.map((row, i) => newRun({ ctx, carId, createdAt }, row, resolved[i] as (typeof resolved)[number]));
  const notes = [...file.notes, ...importNotes(fresh, resolved, places.newTracks, ctx.team.units)];
  return { plan: planOf(file, fresh, places, notes), places, runs };
}

function planOf(file: ParsedPassFile, fresh: PassCsvRow[], places: Places, notes: string[]): ImportPlan {
  const refusedRows = new Set(file.refused.map(({ row }) => row)).size;
  return {
    counts: {
      rows: file.rows.length + refusedRows,
      added: fresh.length,
      refused: refusedRows,
      duplicates: file.rows.length - fresh.length,
      withoutSlip: fresh.filter((row) => row.slipPct === null).length,
    },
    added: fresh.slice(0, PREVIEW_ROWS),
    refused: file.refused.slice(0, SHOWN_REFUSALS),
    unknownColumns: file.unknownColumns,
    missingColumns: file.missingColumns,
    newTracks: places.newTracks.map(({ name, altitudeM, timeZone }) => ({ name, altitudeM, timeZone })),
    newEvents: places.newEvents.map((one) => places.describeEvent(one)),
    newRounds: places.newRounds.map((one) => places.describeRound(one)),
    notes,
  };
}

// A pass whose number or time was corrected since keeps its first row: the same file still adds nothing.
async function knownRuns(ctx: ServerContext, db: Db, carId: string): Promise<Set<string>> {
  const rows = await db
    .select({ passNo: pass.passNo, runAt: pass.runAt })
    .from(pass)
    .where(and(eq(pass.teamId, ctx.team.id), eq(pass.carId, carId)));
  return new Set(rows.map(({ passNo, runAt }) => runKey(passNo, runAt)));
}

const runKey = (passNo: number, time: string): string => `${passNo} ${time}`;

const inRunOrder = (a: PassCsvRow, b: PassCsvRow): number =>
  a.time === b.time ? a.passNo - b.passNo : Number(a.time > b.time) * 2 - 1;

async function knownPlaces(ctx: ServerContext, db: Db): Promise<KnownPlaces> {
  return {
    tracks: await db.select().from(track).where(eq(track.teamId, ctx.team.id)),
    events: await db.select().from(event).where(eq(event.teamId, ctx.team.id)),
    rounds: await db.select().from(round).where(eq(round.teamId, ctx.team.id)),
  };
}
