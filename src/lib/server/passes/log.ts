import { randomUUID } from 'node:crypto';
import { and, eq, isNull, max } from 'drizzle-orm';
import type { Db } from '@/db/client';
import { pass } from '@/db/schema';
import { type PassInput, passInput, siSpeeds, withoutTwins } from '@/lib/forms/pass';
import { auditInsert } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { conflict } from '../errors';
import { activeAdjustables, type RoundPlace, teamCar } from '../lookup';
import { limitWarnings, refuseUnknownKeys } from '../settings';
import { checkLinks } from './links';
import { getPass } from './list';
import { recorded } from './recorded';
import { successor } from './select';
import type { PassRow, PassView } from './view';

export type NewPass = typeof pass.$inferInsert;

export interface LoggedPass extends PassView {
  /** Plain sentences: what looks odd although it was stored. */
  warnings: string[];
}

/**
 * Logs a pass by hand. Without a number it gets the next one of the car. Sent again with the same clientId and values it adds
 * nothing. Throws VALIDATION, NOT_FOUND, or CONFLICT when that pass is there already.
 */
export async function logPass(ctx: ServerContext, raw: unknown): Promise<LoggedPass> {
  requireCan(ctx, 'pass:log');
  const input = passInput.parse(raw);
  await teamCar(ctx, input.carId);
  const adjustables = await activeAdjustables(ctx, input.carId);
  const settings = recorded(input.settings ?? {});
  refuseUnknownKeys(settings, adjustables, 'settings');
  const place = await checkLinks(ctx, input);
  const row = newPass(ctx, { ...input, settings }, place);
  const id = await ctx.write((db) => insertOnce(ctx, db, row, input.passNo === null));
  return { ...(await getPass(ctx, id)).pass, warnings: limitWarnings(settings, adjustables) };
}

type CheckedInput = Omit<PassInput, 'settings'> & { settings: Record<string, number> };

function newPass(ctx: ServerContext, input: CheckedInput, place: RoundPlace): NewPass {
  const id = randomUUID();
  return {
    ...withoutTwins(input),
    ...siSpeeds(input),
    id,
    rootId: id,
    teamId: ctx.team.id,
    passNo: input.passNo ?? 0,
    lane: input.lane ?? place.round.lane,
    slipSource: input.slipPct === null ? null : 'measured',
    source: 'hand',
    enteredBy: ctx.user.id,
    createdAt: ctx.now().toISOString(),
  };
}

async function insertOnce(ctx: ServerContext, db: Db, row: NewPass, needsNumber: boolean): Promise<string> {
  const first = await sentBefore(ctx, db, row.clientId ?? null);
  if (first) return assertSamePass(first, row, needsNumber).id;
  await refuseSameRun(ctx, db, row);
  const numbered = needsNumber ? { ...row, passNo: await nextPassNo(ctx, db, row.carId) } : row;
  await db.batch([
    db.insert(pass).values(numbered),
    auditInsert(db, ctx, 'pass.log', { type: 'pass', id: row.id }, { carId: row.carId, passNo: numbered.passNo }),
  ]);
  return row.id;
}

async function sentBefore(ctx: ServerContext, db: Db, clientId: string | null): Promise<PassRow | null> {
  if (!clientId) return null;
  const [row] = await db
    .select()
    .from(pass)
    .where(and(eq(pass.teamId, ctx.team.id), eq(pass.clientId, clientId)));
  return row ?? null;
}

const SERVER_MADE = new Set(['id', 'rootId', 'createdAt', 'enteredBy', 'teamId']);

function assertSamePass(first: PassRow, again: NewPass, needsNumber: boolean): PassRow {
  const names = Object.keys(again).filter((name) => !SERVER_MADE.has(name) && !(needsNumber && name === 'passNo'));
  const other = names.find((name) => !sameValue(first[name as keyof PassRow], again[name as keyof NewPass]));
  if (other === undefined) return first;
  throw conflict(`This clientId was used before for a pass with another ${other}. Use a new clientId for a new pass.`);
}

const sameValue = (a: unknown, b: unknown): boolean => sortedJson(a) === sortedJson(b);

// Settings may come in another order.
function sortedJson(value: unknown): string {
  if (typeof value !== 'object' || value === null) return JSON.stringify(value ?? null);
  return JSON.stringify(Object.entries(value).sort());
}

async function refuseSameRun(ctx: ServerContext, db: Db, row: NewPass): Promise<void> {
  const [same] = await db
    .select({ passNo: pass.passNo })
    .from(pass)
    .leftJoin(successor, eq(successor.correctsId, pass.id))
    .where(
      and(eq(pass.teamId, ctx.team.id), eq(pass.carId, row.carId), eq(pass.runAt, row.runAt), isNull(successor.id)),
    );
  if (same) throw conflict(`Pass ${same.passNo} of this car was run at that very time. Correct that pass instead.`);
}

async function nextPassNo(ctx: ServerContext, db: Db, carId: string): Promise<number> {
  const [row] = await db
    .select({ last: max(pass.passNo) })
    .from(pass)
    .where(and(eq(pass.teamId, ctx.team.id), eq(pass.carId, carId)));
  return (row?.last ?? 0) + 1;
}
