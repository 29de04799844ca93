/** The values that were given; a blank one is "not recorded" and has no key. */
export function recorded(settings: Readonly<Record<string, number | null>>): Record<string, number> {
  return Object.fromEntries(Object.entries(settings).filter((entry): entry is [string, number] => entry[1] !== null));
}
