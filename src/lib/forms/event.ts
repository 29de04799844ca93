import { z } from 'zod';
import { calendarDate, idField, text } from './fields';

export const eventShape = {
  trackId: idField('Choose the track of the event.'),
  name: text('The event name', 80),
  startsOn: calendarDate('The first day'),
  endsOn: calendarDate('The last day'),
};

/** An event; without a last day it lasts one day. */
export const eventInput = z.object({
  ...eventShape,
  endsOn: z.union([z.literal('').transform(() => undefined), eventShape.endsOn]).optional(),
});
