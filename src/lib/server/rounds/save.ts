import { randomUUID } from 'node:crypto';
import { and, eq, max } from 'drizzle-orm';
import { round } from '@/db/schema';
import { parsePatch, zonedInstant } from '@/lib/forms/fields';
import { roundInput, roundShape } from '@/lib/forms/round';
import { auditInsert, changedFields } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { refuseDuplicate } from '../duplicates';
import { validationError } from '../errors';
import { getEvent } from '../events';
import { getRound, type RoundView } from './list';

/** Adds a round to an event; without a position it comes last. Throws NOT_FOUND (event), VALIDATION or CONFLICT. */
export async function createRound(ctx: ServerContext, raw: unknown): Promise<RoundView> {
  requireCan(ctx, 'round:edit');
  const { plannedAt, plannedAtLocal, ...input } = roundInput.parse(raw);
  const event = await getEvent(ctx, input.eventId);
  const row = {
    ...input,
    ...plannedChange({ plannedAt, plannedAtLocal }, event.timeZone),
    position: input.position ?? (await nextPosition(ctx, event.id)),
    id: randomUUID(),
    teamId: ctx.team.id,
    createdAt: ctx.now().toISOString(),
  };
  await refuseDuplicate('name', taken(row.name), () =>
    ctx.write((db) =>
      db.batch([
        db.insert(round).values(row),
        auditInsert(db, ctx, 'round.create', { type: 'round', id: row.id }, { name: row.name, eventId: event.id }),
      ]),
    ),
  );
  return getRound(ctx, row.id);
}

/** Changes the fields that are sent (the lane when it is drawn). Throws NOT_FOUND, VALIDATION or CONFLICT. */
export async function updateRound(ctx: ServerContext, roundId: string, raw: unknown): Promise<RoundView> {
  requireCan(ctx, 'round:edit');
  const before = await getRound(ctx, roundId);
  const { plannedAt, plannedAtLocal, ...columns } = parsePatch(roundShape, raw);
  const patch = { ...columns, ...plannedChange({ plannedAt, plannedAtLocal }, before.timeZone) };
  const changed = changedFields(before, patch);
  if (Object.keys(changed).length === 0) return before;
  await refuseDuplicate('name', taken(patch.name ?? before.name), () =>
    ctx.write((db) =>
      db.batch([
        db
          .update(round)
          .set(patch)
          .where(and(eq(round.id, roundId), eq(round.teamId, ctx.team.id))),
        auditInsert(db, ctx, 'round.update', { type: 'round', id: roundId }, changed),
      ]),
    ),
  );
  return getRound(ctx, roundId);
}

const taken = (name: string): string => `The event has a round named ${name} already. Choose another name.`;

interface PlannedTwins {
  plannedAt: string | null | undefined;
  plannedAtLocal: string | null | undefined;
}

/** An instant wins over a wall-clock time at the track; nothing sent changes nothing; a blank clears it. */
function plannedChange({ plannedAt, plannedAtLocal }: PlannedTwins, timeZone: string): { plannedAt?: string | null } {
  if (plannedAt) return { plannedAt };
  if (plannedAtLocal) return { plannedAt: atTrack(plannedAtLocal, timeZone) };
  return plannedAt === undefined && plannedAtLocal === undefined ? {} : { plannedAt: null };
}

function atTrack(local: string, timeZone: string): string {
  const instant = zonedInstant(local, timeZone);
  if (instant !== null) return instant;
  const message = 'The planned time must be a date and time at the track, such as 2026-05-03T14:05.';
  throw validationError(message, { plannedAtLocal: message });
}

async function nextPosition(ctx: ServerContext, eventId: string): Promise<number> {
  const [row] = await ctx.db
    .select({ last: max(round.position) })
    .from(round)
    .where(and(eq(round.eventId, eventId), eq(round.teamId, ctx.team.id)));
  return (row?.last ?? 0) + 1;
}
