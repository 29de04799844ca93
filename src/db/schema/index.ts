export * from './car';
export * from './decision';
export * from './season';
export * from './team';
