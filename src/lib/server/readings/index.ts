export { correctReading } from './correct';
export { type EnteredReading, enterReading } from './enter';
export { getReading, latestReading, listReadings, standingReading } from './list';
export type { ReadingView } from './view';
