export { BeatBar } from './beat-bar';
export { SpanBar } from './span-bar';
