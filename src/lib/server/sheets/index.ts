export { listSheets, type SheetSummary } from './list';
export { markSeen } from './seen';
export { currentSheet, getSheet, type SeenMark, type SheetItem, type SheetView } from './view';
