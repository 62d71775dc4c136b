import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import {
  COMMAND_GROUPS,
  type Command,
  type CommandParts,
  GROUP_WORDS,
  type RoomActs,
} from '../../src/app/command';
import { COMMANDS, commandForKey, commandOf } from '../../src/app/commands';
import { isPlainKey, keyName, keyWords } from '../../src/app/key-names';
import {
  actingKeys,
  keyFault,
  keysOf,
  type OwnKeys,
  readOwnKeys,
  shownKey,
} from '../../src/app/own-keys';
import { ACTS_IN_ROOM } from '../../src/app/room-commands';
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
  const clashesAmong = (commands: readonly Command[]) =>
    commands.flatMap((a, i) =>
      commands
        .slice(i + 1)
        .flatMap((b) =>
          a.keys.filter((key) => b.keys.includes(key)).map((key) => `${key}: ${a.id}, ${b.id}`),
        ),
    );

  it('gives no key to two commands: panes lie within a study, a study within the page', () => {
    expect(clashesAmong(COMMANDS.filter(({ when }) => when !== 'room'))).toEqual([]);
  });

  it('gives no key to two commands of the room view, but arrows to the pen and Escape to what is selected first', () => {
    const inRoom = COMMANDS.filter(({ id, when }) => when === 'room' || ACTS_IN_ROOM.test(id));
    expect(clashesAmong(inRoom.filter(({ id }) => !id.startsWith('pen-')))).toEqual([
      'Escape: clear-selection, leave-room',
    ]);
  });

  it('lets nothing act in the room view that opens, prints, saves, signs or shows a dialog', () => {
    const inRoom = COMMANDS.filter(({ id, when }) => when === 'room' || ACTS_IN_ROOM.test(id));
    expect(inRoom.filter(({ words }) => /…|download|sign|report|print|file/i.test(words))).toEqual(
      [],
    );
    const resting = COMMANDS.filter((one) => !inRoom.includes(one)).map(({ id }) => id);
    const named = [
      'open-file',
      'open-session',
      'open-demo',
      'download-session',
      'download-results',
    ];
    expect(resting).toEqual(
      expect.arrayContaining([...named, 'report', 'sign', 'reviewer', 'keys']),
    );
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

  it('lets each command be reached while keys of a single character are off: by another key, or from the keys page', () => {
    const page = commandOf('keys');
    expect(actingKeys(page, { ownKeys: {}, plainKeys: false })).not.toEqual([]);
    const dialog = readFileSync('src/app/keys-dialog.tsx', 'utf8');
    expect(dialog).toContain('command.run(parts)');
    for (const one of COMMANDS) expect(COMMAND_GROUPS, one.id).toContain(one.group);
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

  it('runs what settles doubts once for a held key', () => {
    const once = COMMANDS.filter((one) => one.once).map((one) => one.id);
    expect(once.sort()).toEqual([
      'keep-doubt',
      'look-alikes',
      'mend-doubt',
      'next-doubt',
      'previous-doubt',
    ]);
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
const partsWith = (
  report: boolean,
  plainKeys = true,
  ownKeys: OwnKeys = {},
  room: Partial<RoomActs> | null = null,
): CommandParts => {
  const parts = {
    session: { getState: () => ({ session: {} }) },
    view: { getState: () => ({ selection: { kind: 'beats', ticks: [1] } }) },
    doubts: { getState: () => ({ acts: {}, listed: [] }) },
    shell: { getState: () => ({ plainKeys, ownKeys }) },
    page: { reportOpen: () => report, reportThere: true, room },
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

describe('keys in the room view', () => {
  const room = (penOn: boolean) => partsWith(false, true, {}, { penOn: () => penOn });

  it('edit and step the copy, and open, save or sign nothing', () => {
    expect(commandForKey('V', room(false))?.id).toBe('class-V');
    expect(commandForKey('ArrowDown', room(false))?.id).toBe('row-below');
    expect(commandForKey('Escape', room(false))?.id).toBe('clear-selection');
    for (const key of ['Ctrl+O', 'Ctrl+S', 'Ctrl+Shift+S', 'Shift+R', 'Shift+F', 'Ctrl+G', 'Alt+B'])
      expect(commandForKey(key, room(false)), key).toBeNull();
  });

  it('move the pen while it is on', () => {
    expect(commandForKey('ArrowLeft', room(false))?.id).toBe('seconds-left');
    expect(commandForKey('ArrowLeft', room(true))?.id).toBe('pen-left');
    expect(commandForKey('Space', room(true))?.id).toBe('pen-press');
    expect(commandForKey('Space', room(false))).toBeNull();
  });

  it('of its own rest outside of it', () => {
    expect(commandForKey('D', partsWith(false))?.id).toBe('next-doubt');
    expect(commandForKey('ArrowUp', partsWith(false))).toBeNull();
  });
});

describe('keys that a person has changed', () => {
  const own = { 'next-beat': 'J' };
  const table = { commands: COMMANDS, ownKeys: {} };

  it('act, and the given ones no more', () => {
    expect(commandForKey('J', partsWith(false, true, own))?.id).toBe('next-beat');
    expect(commandForKey('.', partsWith(false, true, own))).toBeNull();
    expect(commandForKey('J', partsWith(false))).toBeNull();
  });

  it('are the ones shown, and rest with the others of a single character', () => {
    const nextBeat = commandOf('next-beat');
    expect(shownKey(nextBeat, { ownKeys: own, plainKeys: true })).toBe('J');
    expect(shownKey(nextBeat, { ownKeys: own, plainKeys: false })).toBe('');
    expect(actingKeys(commandOf('keys'), { ownKeys: {}, plainKeys: false })).toEqual(['F1']);
  });

  it('are refused where another command has the key, which is named', () => {
    const fault = keyFault(commandOf('next-beat'), 'Ctrl+S', table);
    expect(fault).toContain('“Download the session”');
    expect(keyFault(commandOf('next-beat'), 'J', table)).toBeNull();
    expect(keyFault(commandOf('class-N'), 'J', { ...table, ownKeys: own })).toContain(
      '“Next beat”',
    );
    expect(keyFault(commandOf('class-N'), '.', { ...table, ownKeys: own })).toBeNull();
  });

  it('are refused where the browser or moving about the page needs the key', () => {
    for (const key of ['Tab', 'Enter', 'Space', 'Escape', 'Ctrl+W', 'Ctrl+C', 'F5'])
      expect(keyFault(commandOf('next-beat'), key, table), key).toMatch(/kept by the browser/);
    expect(keyFault(commandOf('clear-selection'), 'Escape', table)).toBeNull();
  });

  it('never leave two commands with one key, also where the table gives a new command that key', () => {
    const outside = COMMANDS.filter(({ when }) => when !== 'room');
    const keys = outside.flatMap((one) => keysOf(one, { 'next-beat': 'V' }));
    expect(new Set(keys).size).toBe(keys.length);
    expect(keysOf(commandOf('class-V'), { 'next-beat': 'V' })).toEqual([]);
  });

  it('can always be given back, also one that a command of the room view shares', () => {
    for (const one of COMMANDS)
      for (const key of one.keys) expect(keyFault(one, key, table), one.id).toBeNull();
  });

  it('are read with care', () => {
    expect(readOwnKeys({ 'next-beat': 'J', 'class-N': 7, 'class-V': '' })).toEqual(own);
    expect(readOwnKeys('J')).toEqual({});
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
