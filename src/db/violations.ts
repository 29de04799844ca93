/** Which rule of the database a failed write broke. drizzle wraps the driver's error as its cause. */
export function isUniqueViolation(error: unknown): boolean {
  return errorText(error).includes('UNIQUE constraint failed');
}

function errorText(error: unknown): string {
  if (!(error instanceof Error)) return '';
  return `${error.message} ${errorText(error.cause)}`;
}
