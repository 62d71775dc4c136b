import type { Recording } from '../recording/recording';
import type { StudyIdentity } from '../session/document';

/** Takes what identifies the person out of a text, or leaves it as it is. */
export type Hide = (text: string) => string;

const SHORTEST = 3;
const HIDDEN = '[hidden]';

export const nothingHidden: Hide = (text) => text;

/**
 * Hides the study's code, the name's parts, the file's name, the date and the hash wherever they stand in a text that people
 * or the file wrote. Parts of fewer than three letters are left: they would hide half of every sentence.
 */
export function identityHider(
  { identity, fileName, start }: Recording,
  study: StudyIdentity,
): Hide {
  const date = start.kind === 'known' ? start.local.slice(0, 10) : '';
  const stem = fileName.replace(/\.[^.]*$/, '');
  const nameParts = (identity.name ?? '').split(/[\s,;_^]+/);
  const secrets = [
    fileName,
    stem,
    study.code,
    identity.code ?? '',
    identity.name ?? '',
    ...nameParts,
    ...datesIn(date),
    ...datesIn(study.start?.slice(0, 10) ?? ''),
    study.sha256 ?? '',
  ].filter((secret) => secret.length >= SHORTEST);
  const longestFirst = [...new Set(secrets)].sort((a, b) => b.length - a.length);
  if (longestFirst.length === 0) return nothingHidden;
  const pattern = new RegExp(
    `(?<![\\p{L}\\p{N}])(?:${longestFirst.map(escaped).join('|')})(?![\\p{L}\\p{N}])`,
    'giu',
  );
  return (text) => text.replaceAll(pattern, HIDDEN);
}

/** A date as it may be typed: 2024-05-14, 14.05.2024, 14/05/2024, 05/14/2024. */
function datesIn(date: string): readonly string[] {
  const found = /^(\d{4})-(\d\d)-(\d\d)$/.exec(date);
  if (!found) return [];
  const [, year, month, day] = found;
  return [
    date,
    ...['.', '/', '-'].flatMap((mark) => [
      [day, month, year].join(mark),
      [month, day, year].join(mark),
    ]),
  ];
}

const escaped = (text: string): string => text.replaceAll(/[\\^$.*+?()[\]{}|/]/g, '\\$&');
