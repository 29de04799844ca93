/** Two inputs for one stored value: the same quantity in SI or in another unit. */
type Twin = readonly [value: number | null | undefined, siFactor: number];

/** `{[key]: SI value}` from the first twin that has a value, `{[key]: null}` when one was sent blank, `{}` when none was sent. */
export function firstSent<K extends string>(key: K, ...twins: readonly Twin[]): Partial<Record<K, number | null>> {
  const sent = twins.filter(([value]) => value !== undefined);
  if (sent.length === 0) return {};
  const given = sent.find(([value]) => value !== null);
  return { [key]: given ? (given[0] as number) * given[1] : null } as Partial<Record<K, number | null>>;
}
