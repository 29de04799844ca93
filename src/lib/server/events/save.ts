import { randomUUID } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import { event } from '@/db/schema';
import { eventInput, eventShape } from '@/lib/forms/event';
import { parsePatch } from '@/lib/forms/fields';
import { auditInsert, changedFields } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { refuseDuplicate, refuseProblems } from '../duplicates';
import { teamTrack } from '../lookup';
import { type EventView, getEvent } from './list';

const MAX_DAYS = 31;
const DAY_MS = 86_400_000;

/** Adds an event at one of the team's tracks. Throws NOT_FOUND (track), VALIDATION or CONFLICT. */
export async function createEvent(ctx: ServerContext, raw: unknown): Promise<EventView> {
  requireCan(ctx, 'event:edit');
  const input = eventInput.parse(raw);
  const createdAt = ctx.now().toISOString();
  const row = { ...input, endsOn: input.endsOn ?? input.startsOn, id: randomUUID(), teamId: ctx.team.id, createdAt };
  refuseProblems(dateProblems(row));
  await teamTrack(ctx, row.trackId);
  await refuseDuplicate('name', taken(row.name, row.startsOn), () =>
    ctx.write((db) =>
      db.batch([
        db.insert(event).values(row),
        auditInsert(db, ctx, 'event.create', { type: 'event', id: row.id }, { name: row.name }),
      ]),
    ),
  );
  return getEvent(ctx, row.id);
}

/** Changes the fields that are sent. Throws NOT_FOUND, VALIDATION or CONFLICT. */
export async function updateEvent(ctx: ServerContext, eventId: string, raw: unknown): Promise<EventView> {
  requireCan(ctx, 'event:edit');
  const before = await getEvent(ctx, eventId);
  const patch = parsePatch(eventShape, raw);
  const after = { ...before, ...patch };
  refuseProblems(dateProblems(after));
  if (patch.trackId !== undefined) await teamTrack(ctx, patch.trackId);
  const changed = changedFields(before, patch);
  if (Object.keys(changed).length === 0) return before;
  await refuseDuplicate('name', taken(after.name, after.startsOn), () =>
    ctx.write((db) =>
      db.batch([
        db
          .update(event)
          .set(patch)
          .where(and(eq(event.id, eventId), eq(event.teamId, ctx.team.id))),
        auditInsert(db, ctx, 'event.update', { type: 'event', id: eventId }, changed),
      ]),
    ),
  );
  return getEvent(ctx, eventId);
}

const taken = (name: string, startsOn: string): string =>
  `Your team has an event named ${name} starting on ${startsOn} already. Choose another name or day.`;

function dateProblems({ startsOn, endsOn }: { startsOn: string; endsOn: string }): Record<string, string> {
  if (endsOn < startsOn) return { endsOn: 'The last day must not be before the first day.' };
  const days = (Date.parse(endsOn) - Date.parse(startsOn)) / DAY_MS + 1;
  return days > MAX_DAYS ? { endsOn: `An event lasts ${MAX_DAYS} days at most. Check the dates.` } : {};
}
