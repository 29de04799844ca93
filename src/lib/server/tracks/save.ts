import { randomUUID } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import { track } from '@/db/schema';
import { parsePatch } from '@/lib/forms/fields';
import { siAltitude, trackInput, trackPatchShape } from '@/lib/forms/track';
import { archiveChange } from '../archive';
import { auditInsert, changedFields } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { refuseDuplicate, refuseProblems } from '../duplicates';
import { teamTrack } from '../lookup';
import { getTrack, type TrackView } from './list';

/** Adds a track. Throws VALIDATION, or CONFLICT when the team has a track of that name. */
export async function createTrack(ctx: ServerContext, raw: unknown): Promise<TrackView> {
  requireCan(ctx, 'track:edit');
  const { altitudeFt, ...columns } = trackInput.parse(raw);
  const row = {
    ...columns,
    ...siAltitude({ ...columns, altitudeFt }),
    id: randomUUID(),
    teamId: ctx.team.id,
    createdAt: ctx.now().toISOString(),
  };
  refuseProblems(positionProblems(row));
  await refuseDuplicate('name', nameTaken(row.name), () =>
    ctx.write((db) =>
      db.batch([
        db.insert(track).values(row),
        auditInsert(db, ctx, 'track.create', { type: 'track', id: row.id }, { name: row.name }),
      ]),
    ),
  );
  return getTrack(ctx, row.id);
}

/** Changes the fields that are sent; past readings keep the altitude they were entered with. Throws NOT_FOUND or VALIDATION. */
export async function updateTrack(ctx: ServerContext, trackId: string, raw: unknown): Promise<TrackView> {
  requireCan(ctx, 'track:edit');
  const before = await teamTrack(ctx, trackId);
  const { altitudeFt, archived, ...columns } = parsePatch(trackPatchShape, raw);
  const patch = { ...columns, ...siAltitude({ ...columns, altitudeFt }), ...archiveChange(ctx, archived) };
  refuseProblems(positionProblems({ ...before, ...patch }));
  const changed = changedFields(before, patch);
  if (Object.keys(changed).length === 0) return getTrack(ctx, trackId);
  await refuseDuplicate('name', nameTaken(patch.name ?? before.name), () =>
    ctx.write((db) =>
      db.batch([
        db
          .update(track)
          .set(patch)
          .where(and(eq(track.id, trackId), eq(track.teamId, ctx.team.id))),
        auditInsert(db, ctx, 'track.update', { type: 'track', id: trackId }, changed),
      ]),
    ),
  );
  return getTrack(ctx, trackId);
}

const nameTaken = (name: string): string => `Your team has a track named ${name} already. Choose another name.`;

function positionProblems(place: { latitudeDeg: number | null; longitudeDeg: number | null }): Record<string, string> {
  if (place.latitudeDeg !== null && place.longitudeDeg === null)
    return { longitudeDeg: 'Enter the longitude too, or leave both open.' };
  if (place.latitudeDeg === null && place.longitudeDeg !== null)
    return { latitudeDeg: 'Enter the latitude too, or leave both open.' };
  return {};
}
