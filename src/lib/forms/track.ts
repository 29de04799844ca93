import { z } from 'zod';
import { M_PER_FT } from '@/lib/domain/units';
import { flag, optionalDecimal, text, timeZone } from './fields';
import { firstSent } from './twins';

/** A track. The altitude may come in meters or in feet; meters are stored. */
export const trackShape = {
  name: text('The track name', 80),
  latitudeDeg: optionalDecimal({
    label: 'The latitude',
    unit: 'degrees',
    low: -90,
    high: 90,
    hint: 'South is negative.',
  }),
  longitudeDeg: optionalDecimal({
    label: 'The longitude',
    unit: 'degrees',
    low: -180,
    high: 180,
    hint: 'West is negative.',
  }),
  altitudeM: optionalDecimal({
    label: 'The altitude',
    unit: 'm',
    low: -430,
    high: 4500,
    hint: 'Enter meters here, not feet.',
  }),
  altitudeFt: optionalDecimal({ label: 'The altitude', unit: 'ft', low: -1410, high: 14_700 }),
  timeZone: timeZone('The time zone'),
};

export const trackPatchShape = { ...trackShape, archived: flag('Archived must be yes or no.') };
export const trackInput = z.object({ ...trackShape, timeZone: trackShape.timeZone.default('UTC') });

/** The altitude in meters, present only when one of its twins was sent. */
export const siAltitude = (sent: { altitudeM?: number | null; altitudeFt?: number | null }) =>
  firstSent('altitudeM', [sent.altitudeM, 1], [sent.altitudeFt, M_PER_FT]);
