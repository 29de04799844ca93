export { changeList } from './changes';
export { type Decided, decideSuggestion } from './decide';
