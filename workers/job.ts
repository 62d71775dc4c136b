import { Refusal } from '../src/recording/failure';

/** Longest stretch of work before other messages get their turn. */
const TURN_MS = 8;

/** What long work needs of its surroundings: to say how far it is, to let others in, to be stopped. */
export interface Job {
  /** Says what is being done and how far it is, 0 to 1. */
  progress(step: string, done: number): void;
  /** Lets other messages in when this turn has lasted long enough; throws a Refusal of kind `cancelled` after a stop. */
  breathe(): Promise<void>;
}

export interface JobControl {
  readonly job: Job;
  cancel(): void;
}

/** A job that reports to `tell`. */
export function startJob(tell: (step: string, done: number) => void): JobControl {
  let stopped = false;
  let turnStart = performance.now();
  return {
    cancel: () => {
      stopped = true;
    },
    job: {
      progress: tell,
      async breathe() {
        if (performance.now() - turnStart >= TURN_MS) {
          await nextTurn();
          turnStart = performance.now();
        }
        if (stopped)
          throw new Refusal({
            kind: 'cancelled',
            message: 'The work was stopped.',
            place: null,
            remedy: 'Start it again when it is wanted.',
          });
      },
    },
  };
}

/** Drives a generator that yields how far it is, with turns for others in between; returns its result. */
export async function inTurns<T>(work: Generator<number, T>, job: Job, step: string): Promise<T> {
  for (;;) {
    const next = work.next();
    if (next.done) return next.value;
    job.progress(step, next.value);
    await job.breathe();
  }
}

/** Drives a generator with turns for others in between, saying nothing of how far it is; returns its result. */
export async function withRests<T>(work: Generator<unknown, T>, job: Job): Promise<T> {
  for (;;) {
    const next = work.next();
    if (next.done) return next.value;
    await job.breathe();
  }
}

function nextTurn(): Promise<void> {
  return new Promise((resolve) => {
    const { port1, port2 } = new MessageChannel();
    port1.onmessage = () => {
      port1.close();
      resolve();
    };
    port2.postMessage(null);
  });
}
