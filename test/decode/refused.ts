import { type Failure, Refusal } from '../../src/recording/failure';

/** The failure that a promise is refused with; fails where it is not refused, or by another error. */
export async function refused(promise: Promise<unknown>): Promise<Failure> {
  try {
    await promise;
  } catch (error) {
    if (error instanceof Refusal) return error.failure;
    throw error;
  }
  throw new Error('nothing was refused');
}
