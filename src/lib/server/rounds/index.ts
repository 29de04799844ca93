export { getRound, listRounds, type RoundView } from './list';
export { createRound, updateRound } from './save';
