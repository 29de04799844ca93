export type { CarState, SheetState } from './car-state';
export { getToday, type Today } from './today';
