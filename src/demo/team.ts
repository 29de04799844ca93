/** The invented team. No name here is that of a real person, team, car or place. */
import type { DemoCar, DemoPerson, DemoTeam } from './types';

/** Only ever set on sign-ins of the demo seed, which never runs in production. */
export const DEMO_PASSWORD = 'demo-pass-slipband';

export const DEMO_TEAM: DemoTeam = { name: 'Larkspur Demo Racing', units: 'us' };

const person = (name: string, mailbox: string, role: DemoPerson['role']): DemoPerson => ({
  name,
  email: `${mailbox}@slipband.example`,
  role,
  password: DEMO_PASSWORD,
});

export const DEMO_PEOPLE: readonly DemoPerson[] = [
  person('Marlo Quenby', 'owner', 'owner'),
  person('Tess Arkwell', 'chief', 'crew_chief'),
  person('Ivo Lanmere', 'tuner', 'tuner'),
  person('Pia Hollin', 'crew', 'crew'),
  person('Jun Castelow', 'driver', 'driver'),
];

/** Invented geometry in the range such cars have. */
export const DEMO_CAR: DemoCar = {
  name: 'Larkspur One',
  carClass: 'Demo class, 1000 ft',
  distanceFt: 1000,
  finalDriveRatio: 3.2,
  rolloutM: 2.87,
  rolloutGrowthPerMps: 0.0009,
  frontRolloutM: 1.78,
  pulsesPerTurn: 8,
  bandLowPct: 13,
  bandHighPct: 17,
  slipWindowStartS: 0.5,
  slipWindowEndS: 2.5,
  sensorNote: 'Driveshaft sensor against front-wheel speed; the front wheels count only while they are on the ground.',
};
