import { CholeskyDecomposition, Matrix } from 'ml-matrix';
import type { SunDrive } from './sun-drive';

/**
 * A temperature that the sun drives: offset + gain x drive + drift. Offset and gain are shared by all tracks, each track's gain may
 * differ a little, and the drift is a day's own departure that fades over hours (an Ornstein-Uhlenbeck process). Priors in degC.
 */
export interface SunDrivenPriors {
  offset: number;
  offsetSd: number;
  gain: number;
  gainSd: number;
  trackGainSd: number;
  driftSd: number;
  driftHours: number;
  /** Scatter of single readings about the truth. */
  readingSd: number;
}

export interface DrivenPoint {
  track: string;
  hours: number;
  drive: SunDrive;
}

export interface DrivenReading extends DrivenPoint {
  valueC: number;
}

/** Worth, in readings, of the belief that the priors have the right width; and how far the readings may move it. */
const WIDTH_PRIOR_READINGS = 10;
const WIDTH_RANGE = { low: 0.6, high: 1.6 } as const;

/**
 * What a reading at `at` would show, given earlier ones: the exact conditional normal of the process. Its width is corrected by how
 * well the process foretold the readings one after the other (r' K^-1 r is the sum of those squared errors in their own sds).
 */
export function foretell(
  readings: readonly DrivenReading[],
  at: DrivenPoint,
  priors: SunDrivenPriors,
): { meanC: number; sdC: number } {
  const expected = (p: DrivenPoint): number => priors.offset + priors.gain * p.drive.mean;
  const own = covariance(at, at, priors) + priors.readingSd ** 2;
  if (readings.length === 0) return { meanC: expected(at), sdC: Math.sqrt(own) };
  const n = readings.length;
  const away = readings.map((r) => r.valueC - expected(r));
  const link = readings.map((r) => covariance(r, at, priors));
  // Positive definite always: every reading has its own scatter on the diagonal.
  const solved = new CholeskyDecomposition(covarianceMatrix(readings, priors)).solve(
    new Matrix([away, link]).transpose(),
  );
  const [awaySolved, linkSolved] = [solved.getColumn(0), solved.getColumn(1)];
  return {
    meanC: expected(at) + dot(linkSolved, away),
    sdC: Math.sqrt(Math.max(0, own - dot(linkSolved, link))) * widthFactor(dot(awaySolved, away), n),
  };
}

const dot = (a: readonly number[], b: readonly number[]): number => a.reduce((s, v, i) => s + v * b[i]!, 0);

function widthFactor(surprise: number, n: number): number {
  const factor = Math.sqrt((WIDTH_PRIOR_READINGS + surprise) / (WIDTH_PRIOR_READINGS + n));
  return Math.min(WIDTH_RANGE.high, Math.max(WIDTH_RANGE.low, factor));
}

function covarianceMatrix(readings: readonly DrivenReading[], priors: SunDrivenPriors): Matrix {
  const matrix = Matrix.zeros(readings.length, readings.length);
  readings.forEach((a, i) => {
    for (let j = 0; j < i; j++) {
      const shared = covariance(a, readings[j]!, priors);
      matrix.set(i, j, shared);
      matrix.set(j, i, shared);
    }
    matrix.set(i, i, covariance(a, a, priors) + priors.readingSd ** 2);
  });
  return matrix;
}

/** Of the temperatures themselves, without the scatter of single readings. Unknown cloud stays unknown in the same way for hours. */
export function covariance(a: DrivenPoint, b: DrivenPoint, p: SunDrivenPriors): number {
  const drives = a.drive.mean * b.drive.mean;
  const shared = p.offsetSd ** 2 + p.gainSd ** 2 * drives;
  if (a.track !== b.track) return shared;
  const fade = Math.exp(-Math.abs(a.hours - b.hours) / p.driftHours);
  const cloud = p.gain ** 2 * a.drive.sd * b.drive.sd;
  return shared + p.trackGainSd ** 2 * drives + fade * (p.driftSd ** 2 + cloud);
}
