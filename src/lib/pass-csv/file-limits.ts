/** The one place for the size limits of a pass file. */
export const PASS_CSV_LIMITS = {
  bytes: 20 * 1024 * 1024,
  rows: 50_000,
  columns: 200,
  cellLength: 5_000,
  /** The header is looked for within this many rows. */
  headerSearchRows: 60,
} as const;

export const tooLargeMessage = (): string =>
  `The file is larger than ${PASS_CSV_LIMITS.bytes / 1024 / 1024} MB. Split it by season or event.`;
