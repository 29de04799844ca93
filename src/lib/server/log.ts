/** One JSON line per event on stderr. Values never carry secrets; line breaks are escaped by JSON. */
export function logError(message: string, error: unknown, requestId: string): void {
  const detail =
    error instanceof Error
      ? { name: error.name, message: error.message, stack: error.stack }
      : { value: String(error) };
  console.error(JSON.stringify({ level: 'error', at: new Date().toISOString(), requestId, message, error: detail }));
}
