import { z } from 'zod';
import { LANES } from '@/lib/domain/types';
import { decimal, idField, optionalChoice, optionalInstant, text } from './fields';

const plannedAtLocal = z
  .union([z.string().max(20), z.null()], { error: 'The planned time must be a date and time.' })
  .optional()
  .transform((value) => value?.trim() || null);

/** `plannedAt` carries its offset; `plannedAtLocal` is the wall clock at the track, as a datetime-local input posts it. */
export const roundShape = {
  name: text('The round name', 40),
  position: decimal({ label: 'The position in the event', low: 1, high: 200, integer: true }),
  lane: optionalChoice(LANES, 'Choose the lane: left or right, or leave it open.'),
  plannedAt: optionalInstant('The planned time'),
  plannedAtLocal,
};

/** A round; without a position it comes last. */
export const roundInput = z.object({
  ...roundShape,
  eventId: idField('Choose the event of the round.'),
  position: z.union([z.literal('').transform(() => undefined), roundShape.position]).optional(),
  plannedAt: roundShape.plannedAt.optional(),
  plannedAtLocal: roundShape.plannedAtLocal.optional(),
});

export const roundFilter = z.object({ eventId: z.string().max(64).optional() });
