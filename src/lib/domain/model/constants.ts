/** Every number the model assumes, in one place. ln slip = natural log of slip in percent. */

export const MODEL_VERSION = 'traction-2';

/** Below this many usable passes there is a forecast only from beliefs, and no suggestion. */
export const MIN_PASSES = 8;

/** Prior sd in ln slip, with what one unit of the column is. */
export const PRIOR = {
  intercept: 0.5,
  /** Per 0.05 kg/m3 of air density about 1.15. */
  density: 0.2,
  /** Per 10 degC of track temperature about 38 degC, and for its square. */
  trackTemp: 0.2,
  trackTempSquared: 0.12,
  /** Per 10 degC that track temperature minus dew point lies below 10 degC; damp air, so more slip is expected. */
  dewHinge: 0.3,
  /** Per 5 runs on the discs, saturating; and for a fresh pack. */
  discRuns: 0.1,
  freshDiscs: 0.1,
  /** Left against right. */
  lane: 0.05,
  /** Per 4 rounds into the event. */
  roundInEvent: 0.08,
  /** Pooled effects. */
  track: 0.12,
  trackLane: 0.05,
  event: 0.08,
} as const;

/** An adjustable whose belief is left open: its whole range is taken to move ln slip by this much (one sd). */
export const OPEN_BELIEF_RANGE_SD = 0.7;

/** Noise: prior guess of the residual sd in ln slip, and how many passes that guess is worth. */
export const NOISE_SD_GUESS = 0.12;
export const NOISE_PRIOR_PASSES = 4;

/** Contaminated normal: share of odd passes expected, what that belief is worth in passes, and how much wider they scatter. */
export const OUTLIER_SHARE = 0.06;
export const OUTLIER_PRIOR_PASSES = 30;
export const OUTLIER_WIDTH = 4;

/** Rounds of reweighting. */
export const REWEIGHTING_PASSES = 5;

/** Recalibration: worth of "no correction" in passes, and the range of the factor. */
export const RECALIBRATION_PRIOR_PASSES = 25;
export const RECALIBRATION_RANGE = { low: 0.75, high: 1.5 } as const;

/**
 * The weights of odd passes are chosen with all passes in view, so the one-step-ahead errors come out a little small: measured at
 * 4 % over the simulated seasons of `npm run evaluate`.
 */
export const HINDSIGHT_INFLATION = 1.04;

/** A pass is reported as discounted when its weight is below this. */
export const DISCOUNT_WEIGHT = 0.5;

/** Search. */
export const MAX_CHANGED_ADJUSTABLES = 2;
export const MAX_OFFERS = 3;
/** P(in band) that one step must earn. */
export const COST_PER_STEP = 0.004;
/** P(in band) that a change must gain over no change to be offered. */
export const MIN_GAIN = 0.02;
/** Steps beyond the settings seen so far that a suggestion may go. */
export const STEPS_BEYOND_SEEN = 2;
