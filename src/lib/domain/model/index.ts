export { MIN_PASSES, MODEL_VERSION } from './constants';
export { forecastSettings, type SuggestInput, suggestFor, suggestWith } from './suggest';
export { preparePasses, type TrainedModel, trainModel } from './train';
