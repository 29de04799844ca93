export { correctPass } from './correct';
export { excludePass, restorePass } from './exclude';
export { exportPasses, type PassFileExport } from './export';
export {
  type ImportPlan,
  ImportRefused,
  type ImportResult,
  importPasses,
  planImport,
  UPLOAD_LIMIT_BYTES,
} from './import';
export { getPass, listPasses, type PassPage, type PassWithHistory, passHistory } from './list';
export { type LoggedPass, logPass } from './log';
export { eventLabel, loadPassRecords, trainingHash } from './records';
export type { PassView } from './view';
