export { createSuggestion } from './create';
export { type CurrentSettings, currentSettings } from './current';
export { type LiveForecast, liveForecast } from './forecast';
export { type LaterRun, laterRun } from './later';
export { latestOwnEstimate, listOwnEstimates, type OwnEstimateView, recordOwnEstimate } from './own-estimate';
export type { Staleness } from './staleness';
export { type TestDesign, type TestSession, testSession } from './test-session';
export { getSuggestion, listSuggestions, type SuggestionSummary, type SuggestionView, suggestionRow } from './view';
