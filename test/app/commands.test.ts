import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { COMMAND_GROUPS, type CommandParts, GROUP_WORDS } from '../../src/app/command';
import { COMMANDS, commandForKey, commandOf } from '../../src/app/commands';
import { isPlainKey, keyName, keyWords } from '../../src/app/key-names';
import { BEAT_CLASSES } from '../../src/recording/beat';

const press = (key: string, parts: Partial<Parameters<typeof keyName>[0]> = {}) =>
  keyName({
    key,
    code: '',
    ctrlKey: false,
    metaKey: false,
    altKey: false,
    shiftKey: false,
    ...parts,
  });

describe('the table of commands', () => {
  it('gives no key to two commands: panes lie within a study, a study within the page', () => {
    const clashes = COMMANDS.flatMap((a, i) =>
      COMMANDS.slice(i + 1).flatMap((b) =>
        a.keys.filter((key) => b.keys.includes(key)).map((key) => `${key}: ${a.id}, ${b.id}`),
      ),
    );
    expect(clashes).toEqual([]);
  });

  it('names each command once, with words and at least one key', () => {
    expect(new Set(COMMANDS.map((one) => one.id)).size).toBe(COMMANDS.length);
    for (const { id, words, keys } of COMMANDS) {
      expect(words.trim(), id).not.toBe('');
      expect(keys.length, id).toBeGreaterThan(0);
    }
    const words = COMMANDS.map((one) => one.words);
    expect(new Set(words).size).toBe(words.length);
  });

  it('puts every command under a heading of the keys page', () => {
    const listed = COMMAND_GROUPS.flatMap((group) => COMMANDS.filter((one) => one.group === group));
    expect(listed.length).toBe(COMMANDS.length);
    for (const group of COMMAND_GROUPS) {
      expect(GROUP_WORDS[group]).not.toBe('');
      expect(COMMANDS.some((one) => one.group === group)).toBe(true);
    }
  });

  it('classes a beat by the letter of its class', () => {
    for (const beatClass of BEAT_CLASSES)
      expect(commandOf(`class-${beatClass}`).keys).toEqual([beatClass]);
  });

  it('writes keys as a key press is named, so that each can be reached', () => {
    for (const { id, keys } of COMMANDS)
      for (const name of keys) {
        const parts = name === '+' ? ['+'] : name.split('+');
        const last = parts[parts.length - 1];
        const again = press(/^[A-Z]$/.test(last) ? last.toLowerCase() : last, {
          ctrlKey: parts.includes('Ctrl'),
          altKey: parts.includes('Alt'),
          shiftKey: parts.includes('Shift'),
        });
        expect(again, id).toBe(name);
      }
  });

  it('leaves alone the keys that browsers keep for tabs and windows', () => {
    const kept = ['Ctrl+T', 'Ctrl+N', 'Ctrl+W', 'Ctrl+Tab', 'Ctrl+Shift+T', 'Ctrl+Shift+N', 'F5'];
    for (const { keys } of COMMANDS) for (const key of keys) expect(kept).not.toContain(key);
  });

  it('shows the keys page from the table alone', () => {
    const page = readFileSync('src/app/keys-dialog.tsx', 'utf8');
    expect(page).toContain('COMMANDS');
    expect(page).not.toMatch(/Ctrl\+/);
  });
});

/** Parts with a study open and a beat selected; `report` puts the report in the place of the panes. */
const partsWith = (report: boolean, plainKeys = true): CommandParts => {
  const parts = {
    session: { getState: () => ({ session: {} }) },
    view: { getState: () => ({ selection: { kind: 'beats', ticks: [1] } }) },
    shell: { getState: () => ({ plainKeys }) },
    page: { reportOpen: () => report, reportThere: true },
  };
  return parts as unknown as CommandParts;
};

describe('keys with a study open', () => {
  it('edit beats only while the panes are in sight', () => {
    expect(commandForKey('V', partsWith(false))?.id).toBe('class-V');
    expect(commandForKey('Delete', partsWith(false))?.id).toBe('delete-selected');
    expect(commandForKey('V', partsWith(true))).toBeNull();
    expect(commandForKey('Delete', partsWith(true))).toBeNull();
    expect(commandForKey('Shift+R', partsWith(true))?.id).toBe('report');
  });

  it('of a single character rest while they are switched off', () => {
    expect(commandForKey('V', partsWith(false, false))).toBeNull();
    expect(commandForKey('Ctrl+S', partsWith(false, false))?.id).toBe('download-session');
  });
});

describe('names of keys', () => {
  it('do not depend on Caps Lock, and take Shift only from letters and named keys', () => {
    expect(press('n')).toBe('N');
    expect(press('N')).toBe('N');
    expect(press('N', { shiftKey: true })).toBe('Shift+N');
    expect(press('?', { shiftKey: true })).toBe('?');
    expect(press('ArrowLeft', { shiftKey: true })).toBe('Shift+ArrowLeft');
  });

  it('take the Command key for Ctrl, and other scripts by the place of the key', () => {
    expect(press('z', { metaKey: true })).toBe('Ctrl+Z');
    expect(press('ч', { code: 'KeyX' })).toBe('X');
  });

  it('tell plain keys, which can be switched off, from those that no typing makes', () => {
    for (const name of ['N', 'Shift+N', '?', '+', '0']) expect(isPlainKey(name), name).toBe(true);
    for (const name of ['Ctrl+Z', 'Ctrl+Shift+Z', 'ArrowLeft', 'Shift+ArrowLeft', 'Escape', 'F1'])
      expect(isPlainKey(name), name).toBe(false);
  });

  it('are written for people', () => {
    expect(keyWords('Ctrl+Shift+Z')).toBe('Ctrl + Shift + Z');
    expect(keyWords('Shift+ArrowLeft')).toBe('Shift + ←');
    expect(keyWords('+')).toBe('+');
  });
});
