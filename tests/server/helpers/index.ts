export { type CallOptions, callRoute, type FakeCall, fakeCall, ORIGIN } from './calls';
export { emptyDatabase, unmigratedDatabase } from './database';
export { sampleCar, sampleEvent, sampleRound, sampleSeason, sampleTrack } from './samples';
export { addTeam, contextFor, makeTestDb, otherRoles, TEST_NOW, type TestTeam, type World } from './world';
