export { createAdjustable, updateAdjustable } from './adjustables';
export { createCar } from './create';
export { type CarEffects, carEffects } from './effects';
export { getCar, listCars } from './list';
export { updateCar } from './update';
export type { AdjustableView, CarView } from './view';
