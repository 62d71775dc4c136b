export { makeRoom } from './room-parts';
export { RoomView } from './room-view';
