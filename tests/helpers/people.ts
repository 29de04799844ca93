/** People of the browser tests: signed in through the API, so that a test spends its time on its subject. */
import { randomUUID } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { type APIRequestContext, type APIResponse, type BrowserContextOptions, request } from '@playwright/test';
import { DEMO_PEOPLE } from '@/demo/team';
import type { Role } from '@/lib/domain/permissions';

export interface Person {
  api: Api;
  /** The session, for a browser context of this person. */
  state: NonNullable<BrowserContextOptions['storageState']>;
}

export interface Owner extends Person {
  email: string;
  password: string;
  teamName: string;
}

/** The JSON API as one person. Anything but a 2xx answer fails the test, unless `answer` is used. */
export class Api {
  constructor(readonly request: APIRequestContext) {}

  async get<T>(path: string): Promise<T> {
    return result(await this.request.get(path));
  }

  async post<T>(path: string, data: Record<string, unknown>): Promise<T> {
    return result(await this.request.post(path, { data }));
  }

  /** Imports a pass file; answers how many passes it added. */
  async importPasses(carId: string, csv: string): Promise<number> {
    const file = { name: 'season.csv', mimeType: 'text/csv', buffer: Buffer.from(csv) };
    const answer = await this.request.post('/api/passes/import', { multipart: { file, carId } });
    return (await result<{ counts: { added: number } }>(answer)).counts.added;
  }
}

async function result<T>(answer: APIResponse): Promise<T> {
  if (!answer.ok()) throw new Error(`${answer.status()} ${answer.url()}: ${await answer.text()}`);
  return answer.json();
}

/** Signs in as the demo person of a role. */
export async function signInDemo(origin: string, role: Role): Promise<Person> {
  const person = DEMO_PEOPLE.find((candidate) => candidate.role === role);
  if (!person) throw new Error(`The demo has no ${role}.`);
  const { email, password } = person;
  return asPerson(origin, '/api/auth/sign-in', { email, password });
}

/** Makes a team of its own with its owner. */
export async function signUpOwner(origin: string): Promise<Owner> {
  const mark = randomUUID().slice(0, 8);
  const account = { teamName: `Team ${mark}`, email: `${mark}@owner.example`, password: `five calm words ${mark}` };
  const person = await asPerson(origin, '/api/auth/sign-up', { ...account, name: 'Wren Talbray' });
  return { ...person, ...account };
}

// The session cookie makes the server ask for our own Origin on every write.
async function asPerson(origin: string, path: string, data: Record<string, unknown>): Promise<Person> {
  const api = new Api(await request.newContext({ baseURL: origin, extraHTTPHeaders: { origin } }));
  await api.post(path, data);
  return { api, state: await api.request.storageState() };
}

export const SEASON_FILE = 'fixtures/passes/demo-season.csv';
export const SMALL_FILE = 'fixtures/passes/sample-small.csv';

export interface Car {
  id: string;
  adjustables: { id: string; key: string; label: string; unit: string }[];
}

export interface RaceDay {
  car: Car;
  roundId: string;
  readingId: string;
}

/** A season in the log, a round to be run in three quarters of an hour, and a fresh reading for it, some minutes old. */
export async function addRaceDay({ api }: Person, file = SEASON_FILE): Promise<RaceDay> {
  const car = await api.post<Car>('/api/cars', { name: 'Talbray One' });
  await api.importPasses(car.id, pastSeason(file));
  const [track] = await api.get<{ id: string }[]>('/api/tracks');
  const [plannedAt, takenAt] = [instantIn(45), instantIn(-5)];
  // The day at the track may not be the day in UTC.
  const days = { startsOn: instantIn(-24 * 60).slice(0, 10), endsOn: instantIn(24 * 60).slice(0, 10) };
  const event = await api.post<{ id: string }>('/api/events', {
    trackId: track?.id,
    name: 'Late Season Test',
    ...days,
  });
  const round = await api.post<{ id: string }>('/api/rounds', { eventId: event.id, name: 'T1', plannedAt });
  const reading = await api.post<{ id: string }>('/api/readings', { trackId: track?.id, takenAt, ...USUAL_READING });
  return { car, roundId: round.id, readingId: reading.id };
}

/** The season of an example file in a year that is over, whatever the clock of the test says. */
export const pastSeason = (file: string): string => readFileSync(file, 'utf8').replaceAll('2026-', '2024-');

const instantIn = (minutes: number): string => new Date(Date.now() + minutes * 60_000).toISOString();

/** Inside what the example seasons have seen. */
const USUAL_READING = {
  airTempC: 16,
  relativeHumidity: 0.2,
  pressurePa: 97_000,
  pressureKind: 'station',
  trackTempC: 31,
};
