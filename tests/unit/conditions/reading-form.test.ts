import { describe, expect, it } from 'vitest';
import {
  type FormValues,
  formOfReading,
  humidityKindOf,
  kindsOf,
  measuresOf,
  namedAsInputs,
  readForm,
} from '@/components/conditions/reading-form';

const typed: FormValues = {
  airTempF: '84,2',
  humidityKind: 'dewPointC',
  relativeHumidityPct: '35',
  dewPointF: ' 55.4 ',
  pressureInHg: '29.92',
  pressureKind: 'altimeter',
  trackTempF: '',
  windMph: '5',
  windDirDeg: '225',
  cloudPct: '25',
  trackTempPlace: ' 60 ft ',
};

describe('readForm', () => {
  it('reads comma and point, converts to SI and keeps blanks as not measured', () => {
    const { reading, errors } = readForm(typed, 'us');
    expect(errors).toEqual({});
    expect(reading.airTempC).toBeCloseTo(29, 9);
    expect(reading.dewPointC).toBeCloseTo(13, 9);
    expect(reading.pressurePa).toBeCloseTo(29.92 * 3386.389, 6);
    expect(reading.windMps).toBeCloseTo(2.2352, 9);
    expect(reading).toMatchObject({ trackTempC: null, windDirDeg: 225, cloudPct: 25, trackTempPlace: '60 ft' });
  });

  it('takes only the chosen humidity: what stands in a hidden field does not count, not even a wrong one', () => {
    const { reading, errors } = readForm({ ...typed, wetBulbF: 'abc' }, 'us');
    expect(reading).toMatchObject({ relativeHumidity: null, wetBulbC: null });
    expect(errors).toEqual({});
  });

  it('names what is no number by its input and leaves it out', () => {
    const { reading, errors } = readForm({ ...typed, airTempF: '84 F' }, 'us');
    expect(reading.airTempC).toBeNull();
    expect(errors).toEqual({ airTempF: 'Enter a plain number such as 83.3.' });
  });

  it('reads metric inputs under their own names', () => {
    const { reading } = readForm(
      { airTempC: '29', relativeHumidityPct: '45', pressureHPa: '985', windKmh: '36' },
      'metric',
    );
    expect(reading.airTempC).toBe(29);
    expect(reading.relativeHumidity).toBeCloseTo(0.45, 12);
    expect(reading.pressurePa).toBe(98_500);
    expect(reading.windMps).toBeCloseTo(10, 12);
  });

  it('says no kind of pressure when there is none', () => {
    expect(readForm({ ...typed, pressureInHg: '' }, 'us').reading.pressureKind).toBeNull();
    expect(readForm(typed, 'us').reading.pressureKind).toBe('altimeter');
  });
});

describe('formOfReading', () => {
  it.each(['us', 'metric'] as const)('comes back as it was stored, in %s units', (units) => {
    const stored = {
      airTempC: 29,
      relativeHumidity: null,
      dewPointC: null,
      wetBulbC: 18.5,
      pressurePa: 82_345,
      pressureKind: 'station' as const,
      trackTempC: 47.3,
      trackTempPlace: 'groove',
      windMps: 3,
      windDirDeg: 180,
      cloudPct: 50,
    };
    const { reading } = readForm(formOfReading(stored, units), units);
    expect(reading).toMatchObject({
      relativeHumidity: null,
      dewPointC: null,
      pressureKind: 'station',
      trackTempPlace: 'groove',
    });
    expect(Math.abs((reading.pressurePa ?? 0) - 82_345)).toBeLessThan(1);
    expect(Math.abs((reading.wetBulbC ?? 0) - 18.5)).toBeLessThan(0.001);
    expect(Math.abs((reading.trackTempC ?? 0) - 47.3)).toBeLessThan(0.001);
  });

  it('takes over the way of the last reading, and a usual way when there is none', () => {
    expect(kindsOf(null)).toEqual({ humidityKind: 'relativeHumidity', pressureKind: 'station' });
    expect(humidityKindOf({ humidityKind: 'nonsense' })).toBe('relativeHumidity');
  });
});

describe('names', () => {
  it.each(['us', 'metric'] as const)('every input of the %s form has a name of its own', (units) => {
    const names = measuresOf(units).map(({ name }) => name);
    expect(new Set(names).size).toBe(9);
  });

  it('puts messages of the verb under the inputs, those about kind and altitude under the pressure', () => {
    const named = namedAsInputs({ airTempC: 'a', altitudeM: 'b', takenAt: 'c', reason: 'd' }, 'us');
    expect(named).toEqual({ airTempF: 'a', pressureInHg: 'b', takenAtLocal: 'c', reason: 'd' });
  });
});
