export { type BeliefView, beliefViews } from './belief-view';
export { MIN_PASSES, MODEL_VERSION } from './constants';
export { type Breakdown, type Contribution, contributionsOf } from './contributions';
export { roundOfContext, runFeatures } from './features';
export { forecastLater, laterConditions } from './later-run';
export { type PlannedRun, READING_ERRORS, readingSensitivity, type Sensitivity } from './sensitivity';
export {
  type DesignOptions,
  learningText,
  mostLearned,
  type SessionPlan,
  sessionPlan,
  type TestRun,
  testRuns,
} from './session-design';
export { forecastSettings, type SuggestInput, suggestFor, suggestWith } from './suggest';
export { type TrackReading, type TrackTempForecast, trackTempAt } from './track-temperature';
export { preparePasses, type TrainedModel, trainModel } from './train';
