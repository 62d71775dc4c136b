/** Small print below a table: what a letter beside a figure says. */
export interface Note {
  readonly letter: string;
  readonly text: string;
}

/** Gives texts their letters in the order in which they are first asked for; the same text keeps its letter. */
export interface Notes {
  letterOf(text: string): string;
  list(): readonly Note[];
}

export function createNotes(): Notes {
  const letters = new Map<string, string>();
  return {
    letterOf(text) {
      const known = letters.get(text);
      if (known !== undefined) return known;
      const letter = noteLetter(letters.size);
      letters.set(text, letter);
      return letter;
    },
    list: () => [...letters].map(([text, letter]) => ({ letter, text })),
  };
}

const ALPHABET = 'abcdefghijklmnopqrstuvwxyz';

/** a to z, then aa, ab and on. `index` counts from 0. */
export function noteLetter(index: number): string {
  const last = ALPHABET[index % ALPHABET.length];
  return index < ALPHABET.length
    ? last
    : noteLetter(Math.floor(index / ALPHABET.length) - 1) + last;
}

/** Stands for a column that says nothing. */
const NOTHING = '–';

/**
 * Texts of several columns in one: what all begin or end with is said once ("27; 44; 17 epochs"), null stands as a dash, and
 * texts that are all the same are said once. Words with a digit are never shared, since half a count misleads.
 */
export function inTurn(texts: readonly (string | null)[]): string {
  const said = texts.filter((text) => text !== null);
  if (said.length === 0) return '';
  if (said.every((text) => text === said[0])) return said[0];
  const words = said.map((text) => text.split(' '));
  const least = Math.min(...words.map((one) => one.length)) - 1;
  const start = sharedCount(words, least);
  const end = sharedCount(
    words.map((one) => [...one].reverse()),
    least - start,
  );
  const [first] = words;
  const middles = texts.map((text) => {
    const one = text?.split(' ');
    return one ? one.slice(start, one.length - end).join(' ') : NOTHING;
  });
  return [...first.slice(0, start), middles.join('; '), ...first.slice(first.length - end)].join(
    ' ',
  );
}

/** How many words from the start on are the same in all and hold no digit. */
function sharedCount(words: readonly (readonly string[])[], most: number): number {
  let count = 0;
  while (count < most) {
    const word = words[0][count];
    if (/\d/.test(word) || words.some((one) => one[count] !== word)) break;
    count += 1;
  }
  return count;
}
