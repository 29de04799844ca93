export type { UnitSystem } from '@/lib/domain/display';
export { type DecodedFile, decodePassCsv } from './decode';
export { type ExportLayout, exportPassCsv } from './export';
export { PASS_CSV_LIMITS } from './file-limits';
export { parsePassCsv } from './parse';
export { passKey, toPassRecord } from './record';
export type { ParsedPassFile, PassCsvData, PassCsvRow, PassReading, Refusal } from './types';
