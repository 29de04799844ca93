export { getTrack, listTracks, type TrackView } from './list';
export { createTrack, updateTrack } from './save';
