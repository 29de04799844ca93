export { demoFiles, demoPassRows } from './files';
export { DEMO_SEED, generateDemoSeason } from './season';
export { DEMO_PASSWORD } from './team';
export type * from './types';
