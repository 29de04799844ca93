import fc from 'fast-check';
import { expect, test } from 'vitest';
import { threadGapM } from '@/lib/domain/slip/drive';
import { DEFAULT_BAND } from '@/lib/domain/types';
import * as units from '@/lib/domain/units';
import { type Computed, runCheckPlan, same } from '../../helpers/check-values';

const {
  cToF,
  fDeltaToC,
  ftToM,
  fToC,
  humidityRatioToGrains,
  inHgToPa,
  kgM3ToLbFt3,
  lbFt3ToKgM3,
  mphToMps,
  paToHPa,
  paToInHg,
} = units;

/** From unit and to unit of an entry, e.g. "inHg to hPa". */
const CONVERSIONS: Record<string, (value: number) => number> = {
  'inHg to hPa': (v) => paToHPa(inHgToPa(v)),
  'hPa to inHg': (v) => paToInHg(units.hPaToPa(v)),
  'inHg to kPa': (v) => inHgToPa(v) / units.PA_PER_KPA,
  'degF to degC': fToC,
  'degC to degF': cToF,
  'degF to K': (v) => fToC(v) + units.ZERO_C_IN_K,
  'kg/m3 to lb/ft3': kgM3ToLbFt3,
  'lb/ft3 to kg/m3': lbFt3ToKgM3,
  'ft to m': ftToM,
  'mph to m/s': mphToMps,
  'kg/kg to gr/lb': humidityRatioToGrains,
};

const NOT_STORED = 'no number of the product is in this unit';

runCheckPlan({
  area: 'vehicle_tyre_units',
  ids: (id) => id.startsWith('unit.'),
  formulas: {
    'unit.factors': (): Record<string, Computed> => ({
      inHg_conventional: same(units.PA_PER_INHG),
      mbar: same(units.PA_PER_HPA),
      psi: same(units.PA_PER_PSI),
      lb_per_ft3: same(units.KG_M3_PER_LB_FT3),
      lb: same(units.KG_PER_LB),
      grain: same(units.KG_PER_LB / units.GRAINS_PER_LB),
      inch: same(units.M_PER_IN),
      foot: same(units.M_PER_FT),
      mph: same(units.MPS_PER_MPH),
    }),
    convert: (i, { expected }) => {
      const convert = CONVERSIONS[`${i.value?.unit} to ${expected.value?.unit}`];
      return { value: same(convert ? convert(i.value?.value) : null) };
    },
    temp_diff: (i) => ({ dC: same(fDeltaToC(i.dF?.value)) }),
  },
  skippedIds: {},
  skippedOutputs: {
    'unit.factors': {
      inHg_32F: 'the conventional inch, 3 ppm larger, is used',
      inHg_60F: 'not the inch of a barometer; using it would be a slip',
      mmHg: NOT_STORED,
      atm: NOT_STORED,
      mile: NOT_STORED,
      lbf: NOT_STORED,
      ft_lbf: NOT_STORED,
      hp: NOT_STORED,
      g0: NOT_STORED,
    },
  },
});

runCheckPlan({
  area: 'trade_facts',
  formulas: {
    'trade.slip_target': () => ({ slip: same((DEFAULT_BAND.lowPct + DEFAULT_BAND.highPct) / 2) }),
    thread_gap: (i) => {
      const gapM = threadGapM(i.turns?.value, i.tpi?.value) ?? Number.NaN;
      return { gap: same(gapM / units.M_PER_IN), gap_mm: same(gapM * 1000) };
    },
    quarter_inch: (i) => ({ mm: same(i.inch?.value * units.M_PER_IN * 1000) }),
  },
  skippedIds: { 'trade.turnaround': 'a planning figure the team enters per round; nothing is computed from it here' },
});

const PAIRS: [string, (value: number) => number, (value: number) => number][] = [
  ['temperature', fToC, cToF],
  ['temperature difference', fDeltaToC, units.cDeltaToF],
  ['inHg', inHgToPa, paToInHg],
  ['hPa', units.hPaToPa, paToHPa],
  ['feet', ftToM, units.mToFt],
  ['mph', mphToMps, units.mpsToMph],
  ['km/h', units.kmhToMps, units.mpsToKmh],
  ['lb/ft3', lbFt3ToKgM3, kgM3ToLbFt3],
];

test.each(PAIRS)('%s there and back is the same', (_name, there, back) => {
  fc.assert(
    fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), (value) => {
      expect(Math.abs(back(there(value)) - value)).toBeLessThanOrEqual(1e-9 * Math.max(1, Math.abs(value)));
    }),
  );
});

test('a temperature difference has no offset', () => {
  fc.assert(
    fc.property(
      fc.double({ min: -50, max: 150, noNaN: true }),
      fc.double({ min: -50, max: 150, noNaN: true }),
      (a, b) => {
        expect(Math.abs(fToC(a) - fToC(b) - fDeltaToC(a - b))).toBeLessThan(1e-9);
      },
    ),
  );
});
