import { describe, expect, test } from 'vitest';
import { decisionOf, startOf, waysOf } from '@/components/suggestion/decision-form';
import { decisionInput } from '@/lib/forms/decision';
import { CURRENT, SPECS, suggestion } from './fixture';

const posted = {
  adjustFrom: '0',
  finalSettings: { counterweight_g: '11,5' },
  reason: 'More bite.',
  notes: '',
  publish: 'true',
};

describe('what the decision form posts', () => {
  test('accepting takes the offer that was picked and nothing from the adjust fields', () => {
    expect(decisionOf({ ...posted, pick: 'accept:1' })).toEqual({
      choice: 'accept',
      offerIndex: '1',
      notes: '',
      publish: 'true',
    });
  });

  test('adjusting takes the typed settings, the reason and the offer it started from', () => {
    const decision = decisionInput.parse(decisionOf({ ...posted, pick: 'adjust' }));
    expect(decision).toMatchObject({ choice: 'adjust', offerIndex: 0, reason: 'More bite.', publish: true });
    expect(decision.finalSettings).toEqual({ counterweight_g: 11.5 });
  });

  test('declining takes the reason only', () => {
    expect(decisionOf({ ...posted, pick: 'decline' })).not.toHaveProperty('finalSettings');
  });

  test('nothing picked is refused by the schema, and so is nonsense', () => {
    expect(decisionInput.safeParse(decisionOf(posted)).success).toBe(false);
    expect(decisionInput.safeParse(decisionOf({ ...posted, pick: 'accept-all' })).success).toBe(false);
  });
});

describe('the ways to decide', () => {
  test('each offer can be accepted; adjust and decline are always there', () => {
    expect(waysOf(suggestion(), SPECS).map((way) => [way.value, way.title])).toEqual([
      ['accept:0', 'Accept: counterweight one step up'],
      ['accept:1', 'Accept: no change'],
      ['adjust', 'Adjust: other settings'],
      ['decline', 'Decline: run it as it stands'],
    ]);
  });

  test('with nothing offered the chief still sets it or runs it as it stands', () => {
    const refused = suggestion({ status: 'too_few_passes', offers: [] });
    expect(waysOf(refused, SPECS).map((way) => way.value)).toEqual(['adjust', 'decline']);
    expect(startOf(refused, CURRENT)).toEqual(CURRENT);
  });
});
