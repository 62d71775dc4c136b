import type { Reply } from '../src/recording/failure';
import type { JobId } from './analysis-api';

/** What the page asks of the hash worker. */
export type HashRequest =
  | { readonly kind: 'hash'; readonly job: JobId; readonly blob: Blob }
  | { readonly kind: 'cancel'; readonly job: JobId };

/** What the hash worker tells the page; each job ends with one `ended`. */
export type HashNews =
  | { readonly kind: 'progress'; readonly job: JobId; readonly done: number }
  | { readonly kind: 'ended'; readonly job: JobId; readonly reply: Reply<string> };
