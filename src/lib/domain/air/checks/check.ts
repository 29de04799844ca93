import type { UnitSystem } from '../../display';
import type { RawReading } from '../conditions';

export type ReadingField = keyof RawReading;

/** Something about a reading that cannot be, or hardly can. The message names the likely slip and the fix. */
export interface ReadingCheck {
  field: ReadingField;
  /** `impossible`: refuse it. `unlikely`: ask, and take it if the tuner says so. */
  level: 'impossible' | 'unlikely';
  message: string;
}

/** What is known around a reading. */
export interface CheckContext {
  /** Of the track. */
  altitudeM: number | null;
  latitudeDeg: number | null;
  longitudeDeg: number | null;
  /** ISO 8601 with offset. */
  takenAt: string;
  /** The reading before this one AT THE SAME TRACK. */
  previous?: (RawReading & { takenAt: string }) | null;
  /** The team's units: messages show values as the tuner typed them. */
  units: UnitSystem;
}

export const impossible = (field: ReadingField, message: string): ReadingCheck => ({
  field,
  level: 'impossible',
  message,
});

export const unlikely = (field: ReadingField, message: string): ReadingCheck => ({ field, level: 'unlikely', message });

/** Sentences that are there, with a space between. */
export const sentences = (...parts: (string | null | false)[]): string => parts.filter(Boolean).join(' ');

export const within = (value: number, limit: { low: number; high: number }): boolean =>
  value >= limit.low && value <= limit.high;
