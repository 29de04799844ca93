import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { limitText, minutesBetween, settingsOf, stepped, typedOf } from '@/components/islands/suggestion/stepping';
import { CURRENT, SPECS } from './fixture';

const [counterweight, delay] = SPECS;

describe('step buttons', () => {
  test('move by one step and keep the decimals of the step', () => {
    expect(stepped('11.0', counterweight!, 1)).toBe('11.5');
    expect(stepped('11,0', counterweight!, -1)).toBe('10.5');
    expect(stepped('0.28', delay!, 1)).toBe('0.30');
  });

  test('stop at the limits, and do nothing with what is no number', () => {
    expect(stepped('14.0', counterweight!, 1)).toBeNull();
    expect(stepped('8.0', counterweight!, -1)).toBeNull();
    expect(stepped('', counterweight!, 1)).toBeNull();
    expect(stepped('soft', counterweight!, 1)).toBeNull();
  });

  test('up and down again is where it was', () => {
    fc.assert(
      fc.property(fc.constantFrom(...SPECS), fc.integer({ min: 0, max: 11 }), (spec, steps) => {
        const text = typedOf({ [spec.key]: spec.low + steps * spec.step }, [spec])[spec.key]!;
        const up = stepped(text, spec, 1)!;
        expect(Number(up)).toBeGreaterThan(Number(text));
        expect(stepped(up, spec, -1)).toBe(text);
      }),
    );
  });
});

describe('typed settings', () => {
  test('become numbers only when all of them are numbers', () => {
    expect(settingsOf(typedOf(CURRENT, SPECS), SPECS)).toEqual(CURRENT);
    expect(settingsOf({ ...typedOf(CURRENT, SPECS), launch_rpm: '' }, SPECS)).toBeNull();
  });

  test('outside the limits are named with the limit', () => {
    expect(limitText('14.5', counterweight!)).toBe('above the high limit of 14.0 g');
    expect(limitText('7', counterweight!)).toBe('below the low limit of 8.0 g');
    expect(limitText('14', counterweight!)).toBeNull();
  });

  test('cost the minutes of what differs', () => {
    expect(minutesBetween(CURRENT, CURRENT, SPECS)).toBe(0);
    expect(minutesBetween(CURRENT, { ...CURRENT, counterweight_g: 12, launch_rpm: 7400 }, SPECS)).toBe(13);
  });
});
