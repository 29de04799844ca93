import { describe, expect, test } from 'vitest';
import { callFor } from '@/components/suggestion/call';
import { headlineOf } from '@/components/suggestion/headline';
import { changeText, minutesLine, offerTitle, settingText, stepsText } from '@/components/suggestion/settings';
import { CURRENT, SPECS, spread, suggestion } from './fixture';

const [counterweight] = SPECS;

describe('settings in words', () => {
  test('a change says from, to, steps and minutes', () => {
    const change = { key: 'counterweight_g', from: 11, to: 11.5, steps: 1, minutes: 12 };
    expect(changeText(change, SPECS)).toBe('Counterweight 11.0 to 11.5 g, one step up, 12 min');
  });

  test('a value is as precise as its step, and finer when it is finer', () => {
    expect(settingText(11, counterweight!)).toBe('11.0 g');
    expect(settingText(11.25, counterweight!)).toBe('11.25 g');
  });

  test('steps are counted in words, with their direction', () => {
    expect([1, -2, 12].map(stepsText)).toEqual(['one step up', 'two steps down', '12 steps up']);
  });

  test('minutes stand against the time that is left', () => {
    expect(minutesLine(12, 48)).toBe('12 min of 48 min left');
    expect(minutesLine(12, 10)).toBe('12 min, more than the 10 min left');
    expect(minutesLine(12, null)).toBe('12 min of work');
    expect(minutesLine(0, 48)).toBe('No work');
  });

  test('an adjustable that the car no longer has is still named', () => {
    expect(offerTitle([{ key: 'old_g', from: 1, to: 2, steps: 1, minutes: 1 }], SPECS)).toBe('old_g one step up');
  });
});

describe('headline', () => {
  test('names the change, how likely it is, and what it is measured against', () => {
    const { title, lead } = headlineOf(suggestion(), SPECS);
    expect(title).toBe('Counterweight one step up: likely in the band');
    expect(lead).toBe('With this change slip in the band is likely, about 7 in 10 (70 %); as the car stands, 30 %.');
  });

  test('says so when no change is best', () => {
    const forecast = spread(12.5, 17.5);
    const hold = { settings: CURRENT, changes: [], minutes: 0, forecast, sixtyFt: null };
    const { title, lead } = headlineOf(suggestion({ status: 'hold', offers: [hold], noChange: forecast }), SPECS);
    expect(title).toBe('No change: likely in the band');
    expect(lead).toContain('As the car stands');
  });

  test('a refusal says how many passes are missing', () => {
    const result = suggestion({ status: 'too_few_passes', offers: [], noChange: null, passesUsed: 5 });
    expect(headlineOf(result, SPECS).title).toBe('No change offered: 3 more passes needed');
  });

  test('a refusal names what is outside experience', () => {
    const outsideVariables = ['track temperature', 'dew margin'];
    const result = suggestion({ status: 'outside_experience', offers: [], outsideVariables });
    expect(headlineOf(result, SPECS).title).toBe(
      'No change offered: track temperature and dew margin outside your passes',
    );
  });
});

describe('whose call it is', () => {
  test('the chief reads "your call", everybody else whose it is, and afterwards who decided', () => {
    expect(callFor('crew_chief', null).text).toMatch(/^Your call/);
    expect(callFor('tuner', null).text).toMatch(/^The crew chief's call/);
    expect(callFor('crew_chief', { byName: 'Tess Arkwell' }).text).toBe('Decided by Tess Arkwell.');
  });
});
