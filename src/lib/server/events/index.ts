export { type EventView, getEvent, listEvents } from './list';
export { createEvent, updateEvent } from './save';
