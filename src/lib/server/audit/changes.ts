/** What a change did, for the audit: the fields whose value differs, old and new. */
export function changedFields(
  before: Readonly<Record<string, unknown>>,
  patch: Readonly<Record<string, unknown>>,
): Record<string, { from: unknown; to: unknown }> {
  const changed: Record<string, { from: unknown; to: unknown }> = {};
  for (const [name, to] of Object.entries(patch)) {
    if (before[name] !== to) changed[name] = { from: before[name] ?? null, to };
  }
  return changed;
}
