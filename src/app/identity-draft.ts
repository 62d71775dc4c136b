import type { Identity } from '../recording/recording';

type Named = Pick<Identity, 'code' | 'name'>;

const plain = (text: string): string =>
  text
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]+/gu, ' ')
    .trim();

const isName = (code: string, { name }: Named): boolean =>
  name !== null && plain(name) !== '' && plain(code) === plain(name);

/**
 * The code offered for a study: that of its kept session, or the header's own field for one. Text that may be a person's
 * name is never offered; '' asks for a code.
 */
export function offeredCode(identity: Named, keptCode: string | null): string {
  const code = keptCode ?? identity.code ?? '';
  return keptCode === null && isName(code, identity) ? '' : code;
}

/** What is wrong with a typed code: there must be one, and it must not be the name the header has. Null where it is good. */
export function codeFault(typed: string, identity: Named): string | null {
  const code = typed.trim();
  if (code === '') return 'Type a code, for example the number of the study.';
  if (isName(code, identity) && plain(code) !== plain(identity.code ?? ''))
    return 'This is the name in the header. Type a code that names nobody.';
  return null;
}
