/** Why work could not be kept in one of the two places, in words for the person. */
export interface KeepFailure {
  readonly kind:
    | 'disabled'
    | 'full'
    | 'too-large'
    | 'other-tab'
    | 'occupied'
    | 'newer'
    | 'unexpected';
  readonly message: string;
}

const DOWNLOAD = 'Download the session to keep the work in a file.';

const MESSAGES: Readonly<Record<Exclude<KeepFailure['kind'], 'unexpected'>, string>> = {
  disabled: `This browser does not let the program keep anything (private browsing, or site data is blocked). ${DOWNLOAD}`,
  full: `The browser's store is full. Forget studies that are no longer needed, or download the session to keep the work in a file.`,
  'too-large': 'The session is over 1 MB, so there is no second copy of it in this browser.',
  'other-tab': `The study was opened in another tab, which keeps its work from then on. ${DOWNLOAD}`,
  occupied:
    'Another session of this study is kept in this browser. It was left as it is: continue it, replace it, or forget the study first.',
  newer: `A newer version of the program keeps its sessions in this browser; they were left as they are. ${DOWNLOAD}`,
};

/** A failure of a known kind with its words. */
export function keepFailure(kind: Exclude<KeepFailure['kind'], 'unexpected'>): KeepFailure {
  return { kind, message: MESSAGES[kind] };
}

const KINDS: Readonly<Record<string, 'disabled' | 'full' | 'newer'>> = {
  QuotaExceededError: 'full',
  NS_ERROR_DOM_QUOTA_REACHED: 'full',
  SecurityError: 'disabled',
  InvalidStateError: 'disabled',
  NotAllowedError: 'disabled',
  VersionError: 'newer',
};

/** The failure in what a store threw, told by the error's name as the standards for storage define them. */
export function failureOf(error: unknown): KeepFailure {
  const name = error instanceof Error || error instanceof DOMException ? error.name : '';
  if (Object.hasOwn(KINDS, name)) return keepFailure(KINDS[name]);
  const words = error instanceof Error ? error.message : String(error);
  return {
    kind: 'unexpected',
    message: `The work could not be kept in this browser (${words}). ${DOWNLOAD}`,
  };
}
