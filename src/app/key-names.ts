/** The part of a keyboard event that names a key. */
export interface KeyPress {
  readonly key: string;
  readonly code: string;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly altKey: boolean;
  readonly shiftKey: boolean;
}

const isLetter = (key: string): boolean => /^[a-z]$/i.test(key);
const isSign = (key: string): boolean => key.length === 1 && !isLetter(key) && key !== ' ';

/**
 * The name a key press has in the table of commands: modifiers in the order Ctrl, Alt, Shift, then the key ("Ctrl+Shift+Z",
 * "L", "?", "ArrowLeft"). The Command key counts as Ctrl. Letters are capitals whatever Shift or Caps Lock; signs carry no
 * Shift, since keyboards differ in how a sign is reached. Letters of other scripts are taken by their place on the keyboard.
 */
export function keyName(press: KeyPress): string {
  const byPlace = /^Key([A-Z])$/.exec(press.code)?.[1];
  const foreign = press.key.length === 1 && press.key.charCodeAt(0) > 127;
  const key = foreign && byPlace ? byPlace : press.key;
  const parts = [
    press.ctrlKey || press.metaKey ? 'Ctrl' : '',
    press.altKey ? 'Alt' : '',
    press.shiftKey && !isSign(key) ? 'Shift' : '',
    isLetter(key) ? key.toUpperCase() : key === ' ' ? 'Space' : key,
  ];
  return parts.filter((part) => part !== '').join('+');
}

/** True for a key that is typed as one character, so that it can be switched off (WCAG 2.2, 2.1.4). */
export function isPlainKey(name: string): boolean {
  if (/^(Ctrl|Alt)\+/.test(name)) return false;
  const last = name.length === 1 ? name : name.replace(/^Shift\+/, '');
  return last.length === 1;
}

const SHOWN: Readonly<Record<string, string>> = {
  ArrowLeft: '←',
  ArrowRight: '→',
  ArrowUp: '↑',
  ArrowDown: '↓',
  PageUp: 'Page up',
  PageDown: 'Page down',
  Escape: 'Esc',
};

/** A key's name as people read it: "Ctrl + Shift + Z", "Shift + ←". */
export function keyWords(name: string): string {
  const parts = name === '+' ? ['+'] : name.replace(/\+\+$/, '+plus').split('+');
  return parts.map((part) => (part === 'plus' ? '+' : (SHOWN[part] ?? part))).join(' + ');
}
