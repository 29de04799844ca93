/** Every page of the product with an address to open it at, from the page files: a new page is tested without being listed. */
import { readdirSync } from 'node:fs';
import { addRaceDay, type Owner } from './people';

/** Route patterns of the page files: "/cars/[id]/edit". */
export function pageRoutes(): string[] {
  const files = readdirSync('src/pages', { recursive: true, encoding: 'utf8' });
  return files
    .filter((file) => file.endsWith('.astro') && !/(^|\/)_/.test(file))
    .map((file) => `/${file.replace(/\.astro$/, '').replace(/(^|\/)index$/, '')}`)
    .sort();
}

/** A thing of the team for the part of an address that varies, by the folder it is in. */
export type Ids = Readonly<Record<string, string>>;

/** Throws for a page whose varying part nothing is known for: give it an id below. */
export function addressOf(route: string, ids: Ids): string {
  return route.replaceAll(/([\w-]+)\/\[\w+\]/g, (_, folder: string) => {
    const id = ids[folder];
    if (id === undefined) throw new Error(`Name an id for ${route} in tests/helpers/routes.ts.`);
    return `${folder}/${id}`;
  });
}

/** A team in the middle of its day: one suggestion decided with its launch sheet, one still open. */
export async function teamWithEverything(owner: Owner): Promise<Ids> {
  const { api } = owner;
  const { car, roundId, readingId } = await addRaceDay(owner);
  const asked = { carId: car.id, roundId, readingId };
  await api.post('/api/own-estimates', { carId: car.id, roundId, slipPct: 15, lowPct: 13, highPct: 17 });
  const decided = await api.post<{ id: string }>('/api/suggestions', asked);
  const accepted = { choice: 'accept', offerIndex: 0, notes: 'Watch for a soft spot at the hit' };
  const { sheet } = await api.post<{ sheet: { id: string } }>(`/api/suggestions/${decided.id}/decision`, accepted);
  const open = await api.post<{ id: string }>('/api/suggestions', { ...asked, minutesLeft: 40 });
  const [track] = await api.get<{ id: string }[]>('/api/tracks');
  const [event] = await api.get<{ id: string }[]>('/api/events');
  const { passes } = await api.get<{ passes: { rootId: string }[] }>(`/api/passes?carId=${car.id}&limit=1`);
  return {
    cars: car.id,
    adjustables: car.adjustables[0]?.id ?? '',
    tracks: track?.id ?? '',
    events: event?.id ?? '',
    conditions: readingId,
    passes: passes[0]?.rootId ?? '',
    suggestions: open.id,
    sheet: sheet.id,
  };
}
