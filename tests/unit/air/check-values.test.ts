import { airIndex } from '@/lib/domain/air/air-index';
import { airSummary } from '@/lib/domain/air/conditions';
import { airDensityKgM3, CIPM_2007, cipmParts } from '@/lib/domain/air/density';
import {
  dewPointC,
  grainsPerLb,
  humidityFromDewPoint,
  humidityFromWetBulb,
  humidityRatio,
  humidityRatioFromWetBulb,
  vapourPressureOfRatioPa,
  vapourPressurePa,
  wetBulbC,
} from '@/lib/domain/air/humidity';
import { stationPressurePa } from '@/lib/domain/air/pressure';
import { saturationVapourPressurePa } from '@/lib/domain/air/saturation';
import {
  densityAltitudeM,
  ISA,
  ISA_DENSITY_EXPONENT,
  ISA_PRESSURE_EXPONENT,
  ISA_SEA_LEVEL_DENSITY,
  isaDensityKgM3,
  isaPressurePa,
  isaTempK,
  pressureAltitudeM,
} from '@/lib/domain/air/standard-atmosphere';
import { hPaToPa, inHgToPa, kPaToPa, mToFt, paToHPa } from '@/lib/domain/units';
import { type Computed, other, type Quantity, runCheckPlan, same } from '../../helpers/check-values';

type Inputs = Record<string, Quantity>;

const PA_PER_MMHG = 133.3224; // NIST SP 811
const feet = (m: number | null): number | null => (m === null ? null : mToFt(m));
const hPa = (pa: number | null): number | null => (pa === null ? null : paToHPa(pa));
const num = (i: Inputs, name: string): number => i[name]?.value;
const percent = (fraction: number | null): number | null => (fraction === null ? null : fraction * 100);

const constantsOf = (table: object, by = same): Record<string, Computed> =>
  Object.fromEntries(Object.entries(table).map(([name, value]) => [name, by(value as number)]));

const station = (i: Inputs): number | null => stationPressurePa(hPaToPa(num(i, 'altimeter')), num(i, 'elevation'));
const errorPercent = (wrong: number | null, right: number | null): number | null =>
  wrong === null || right === null ? null : percent(wrong / right - 1);

runCheckPlan({
  area: 'air_density',
  formulas: {
    'air.cipm2007.constants': () => {
      const { maOverR, oneMinusMvOverMa, ...printed } = CIPM_2007;
      return {
        ...constantsOf(printed),
        Ma_over_R_times_1e6: same(maOverR * 1e6),
        one_minus_Mv_over_Ma: same(oneMinusMvOverMa),
      };
    },
    cipm2007: (i) => {
      const parts = cipmParts(num(i, 't'), num(i, 'p'), num(i, 'RH'));
      return {
        rho: same(airDensityKgM3(num(i, 't'), num(i, 'p'), num(i, 'RH'))),
        Z: same(parts.compressibility),
        f: same(parts.enhancement),
        psv: same(parts.saturationPa),
        xv: same(parts.moleFraction),
      };
    },
    cipm2007_mmHg: (i) => ({ rho: same(airDensityKgM3(num(i, 't'), num(i, 'p') * PA_PER_MMHG, num(i, 'RH'))) }),
    oiml_r111: (i) => ({ rho: other(airDensityKgM3(num(i, 't'), hPaToPa(num(i, 'p')), num(i, 'RH') / 100)) }),
    isa: (i) => isaState(num(i, 'H')),
    'air.isa.constants': () =>
      constantsOf({
        T0: ISA.seaLevelTempK,
        p0: ISA.seaLevelPressurePa,
        rho0: ISA_SEA_LEVEL_DENSITY,
        L: ISA.lapseKPerM,
        g0: ISA.gravityMps2,
        R_dry: ISA.gasConstantDryAir,
        g0_over_RL: ISA_PRESSURE_EXPONENT,
        density_exponent: ISA_DENSITY_EXPONENT,
      }),
    isa_geometric: (i) => ({ H: other(num(i, 'Z')), ...isaState(num(i, 'Z'), other) }),
    density_altitude: (i) => altitudes(densityAltitudeM(num(i, 'rho'))),
    density_altitude_weather: (i) => {
      const rho = airDensityKgM3(num(i, 't'), num(i, 'p_station'), num(i, 'RH'));
      return { rho: same(rho), ...altitudes(densityAltitudeM(rho)) };
    },
    nws_density_altitude: (i) => {
      const rh = humidityFromDewPoint(num(i, 't'), num(i, 'td'));
      const rho = airDensityKgM3(num(i, 't'), inHgToPa(num(i, 'p_station')), rh);
      return { H_ft: other(feet(densityAltitudeM(rho))) };
    },
    pressure_altitude: (i) => altitudes(pressureAltitudeM(num(i, 'p_station'))),
    altimeter_to_station: (i) => ({ p_station: same(hPa(station(i))) }),
    wrong_pressure: (i) => ({
      p_station: same(hPa(station(i))),
      error_percent: same(errorPercent(num(i, 'altimeter'), hPa(station(i)))),
    }),
  },
  skippedIds: {
    'air.nws_pressure_altitude.950hPa':
      'the NWS pressure-altitude constants are not used: ours is the exact inverse of the standard atmosphere, judged by air.pressure_altitude.*',
    'air.sea_level_pressure.psychrolib': 'pressure reduced to sea level by temperature is not computed by the product',
  },
  skippedOutputs: {
    'air.cipm2007.constants': {
      R: 'enters only as the printed Ma/R',
      Ma: 'enters only as the printed Ma/R',
      Mv: 'enters only as the printed 1 - Mv/Ma',
      xCO2_reference: 'fixed inside the printed Ma/R',
    },
    wrong_pressure: {
      rho_right:
        'dry ideal gas with a rounded constant; the product uses CIPM-2007, whose error in percent is the same',
      rho_wrong: 'as rho_right',
    },
  },
});

const isaState = (h: number, by = same): Record<string, Computed> => ({
  T: by(isaTempK(h)),
  p: by(isaPressurePa(h)),
  rho: by(isaDensityKgM3(h)),
});

const altitudes = (m: number | null): Record<string, Computed> => ({ H: same(m), H_ft: same(feet(m)) });

const OTHER_SATURATION =
  'another saturation formula; the product uses Hyland-Wexler, judged by psy.psat.hyland_wexler.*';

runCheckPlan({
  area: 'psychrometrics',
  formulas: {
    psat_hw: (i) => ({ psat: same(saturationVapourPressurePa(num(i, 't'))) }),
    'psy.psat.if97.20C': (i) => ({ psat: other(saturationVapourPressurePa(num(i, 'T') - 273.15)) }),
    'psy.psat.if97.35C': (i) => ({ psat: other(saturationVapourPressurePa(num(i, 'T') - 273.15)) }),
    Wsat_ideal: (i) => ({ W: same(humidityRatio(saturationVapourPressurePa(num(i, 't')), num(i, 'p'))) }),
    W_from_e: (i) => ({
      W: same(humidityRatio(num(i, 'e'), num(i, 'p'))),
      grains: same(grainsPerLb(num(i, 'e'), num(i, 'p'))),
    }),
    dewpoint: (i) => ({
      e: same(vapourPressurePa(num(i, 't'), num(i, 'RH'))),
      td: same(dewPointC(num(i, 't'), num(i, 'RH'))),
      td_wmo_magnus: other(dewPointC(num(i, 't'), num(i, 'RH'))),
    }),
    rh_from_dewpoint: (i) => ({
      RH: same(humidityFromDewPoint(num(i, 't'), num(i, 'td'))),
      RH_wmo_magnus: other(humidityFromDewPoint(num(i, 't'), num(i, 'td'))),
    }),
    W_from_wetbulb: (i) => ({ W: same(humidityRatioFromWetBulb(num(i, 't'), num(i, 'tw'), num(i, 'p'))) }),
    ashrae_example1: (i) => {
      const rh = humidityFromWetBulb(num(i, 't'), num(i, 'tw'), num(i, 'p'));
      return {
        W: same(humidityRatioFromWetBulb(num(i, 't'), num(i, 'tw'), num(i, 'p'))),
        td: same(dewPointC(num(i, 't'), rh)),
        RH: same(rh),
      };
    },
    psychrometer: (i) => {
      const [t, tw, p] = [num(i, 't'), num(i, 'tw'), hPaToPa(num(i, 'p'))];
      const e = hPa(vapourPressureOfRatioPa(humidityRatioFromWetBulb(t, tw, p), p));
      return {
        e_thermodynamic: same(e),
        e_wmo: other(e),
        e_ams: other(e),
        RH_wmo: other(humidityFromWetBulb(t, tw, p)),
      };
    },
    psy_state: (i) => {
      const [t, rh, p] = [num(i, 't'), num(i, 'RH'), num(i, 'p')];
      const e = vapourPressurePa(t, rh);
      return {
        e: same(e),
        W: same(humidityRatio(e, p)),
        grains: same(grainsPerLb(e, p)),
        td: same(dewPointC(t, rh)),
        tw: same(wetBulbC(t, rh, p)),
        rho: other(airDensityKgM3(t, p, rh)),
      };
    },
  },
  skippedIds: {
    'psy.psat.wmo_magnus.0C': OTHER_SATURATION,
    'psy.psat.wmo_magnus.20C': OTHER_SATURATION,
    'psy.psat.wmo_magnus.30C': OTHER_SATURATION,
    'psy.psat.buck1996.20C': OTHER_SATURATION,
    'psy.psat.buck1996.30C': OTHER_SATURATION,
    'psy.psat.if97.300K': `${OTHER_SATURATION}; the entry states no tolerance for another formula (IF97 at 20 and 35 degC is judged)`,
    'psy.enhancement.wmo.1000hPa': 'density takes the enhancement factor of CIPM-2007, judged by air.cipm2007.* (f)',
  },
  skippedOutputs: {
    ashrae_example1: {
      h: 'enthalpy is not computed by the product',
      v: 'specific volume is not computed by the product',
    },
    psy_state: { h: 'enthalpy is not computed by the product', v: 'specific volume is not computed by the product' },
  },
});

const ONE_INDEX = 'the product shows one air index (SAE J1349) and no other correction factor';
const summary = (i: Inputs, pa: number) =>
  airSummary({ airTempC: num(i, 't'), relativeHumidity: num(i, 'RH'), stationPressurePa: pa, trackTempC: null });

runCheckPlan({
  area: 'correction_factors',
  formulas: {
    sae_j1349: (i) => ({ CF: same(airIndex(num(i, 't'), kPaToPa(num(i, 'p_dry')))) }),
    cf_weather: (i) => {
      const air = summary(i, kPaToPa(num(i, 'p_station')));
      const e = (air.vapourPressurePa ?? Number.NaN) / 1000;
      return {
        e: same(e),
        p_dry: same(num(i, 'p_station') - e),
        CF_j1349: same(air.airIndex),
        rel_density_isa: other(air.relativeDensity),
      };
    },
    relative_density: (i) => ({ moist: same(summary(i, num(i, 'p_station')).relativeDensity) }),
    reference_densities: () => ({ isa_15C_101325: same(ISA_SEA_LEVEL_DENSITY) }),
  },
  skippedIds: {
    'cf.un_r85.99kPa_298K': ONE_INDEX,
    'cf.un_r85.95kPa_305K': ONE_INDEX,
    'cf.std60F.29.92inHg_60F': ONE_INDEX,
    'cf.std60F.29.1inHg_88F': ONE_INDEX,
  },
  skippedOutputs: {
    cf_weather: { 'CF_std_60F_29.92': ONE_INDEX, alpha_r85: ONE_INDEX, ratio_std_to_j1349: ONE_INDEX },
    relative_density: { dry_part: 'the dry-air part alone is not shown' },
    reference_densities: {
      'std_60F_29.92inHg': 'relative density has one reference: the standard atmosphere',
      j1349_25C_99kPa: 'as above',
      n1_20C_101325: 'as above',
    },
  },
});

// Summary and conditions use the same functions; the summary is what screens show, so one published state goes through it whole.
runCheckPlan({
  area: 'psychrometrics',
  ids: (id) => id === 'psy.state.30C_60_98000',
  formulas: {
    psy_state: (i) => {
      const air = summary(i, num(i, 'p'));
      return {
        e: same(air.vapourPressurePa),
        W: same(air.humidityRatio),
        grains: same(air.grainsPerLb),
        td: same(air.dewPointC),
        tw: same(air.wetBulbC),
        rho: other(air.densityKgM3),
      };
    },
  },
  skippedIds: {},
  skippedOutputs: { psy_state: { h: 'not computed', v: 'not computed' } },
});
