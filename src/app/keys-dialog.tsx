import { useState } from 'react';
import { flushSync } from 'react-dom';
import { useApp, useShell } from './app-context';
import { COMMAND_GROUPS, type Command, type CommandParts, GROUP_WORDS } from './command';
import { COMMANDS, canRun } from './commands';
import { Dialog } from './dialog';
import { Field, Tick } from './fields';
import { isPlainKey, keyName, keyWords } from './key-names';
import { keyFault, keysOf } from './own-keys';

interface PageProps {
  readonly parts: CommandParts;
}

/**
 * Every command with its keys, from the one table: found by a word, done from here by its button, given another key, and the
 * switch for keys that are a single character.
 */
export function KeysDialog({ parts }: PageProps) {
  const { shell } = useApp();
  const plainKeys = useShell((state) => state.plainKeys);
  const [sought, setSought] = useState('');
  const [changing, setChanging] = useState(false);
  const wanted = sought.trim().toLowerCase();
  const found = COMMANDS.filter(({ words }) => words.toLowerCase().includes(wanted));
  return (
    <Dialog title="Keys" size="large" onClose={() => shell.getState().closeDialog()}>
      <div className="keys-top">
        <Field label="Find a command" value={sought} onChange={setSought} size="short" autoFocus />
        <button
          type="button"
          className="button"
          aria-pressed={changing}
          onClick={() => setChanging(!changing)}
        >
          {changing ? 'Done changing' : 'Change keys'}
        </button>
        <GivenKeys />
      </div>
      <Tick
        label="Keys of a single letter, digit or sign act (with Shift or without)"
        checked={plainKeys}
        onChange={(on) => shell.getState().setPlainKeys(on)}
      />
      <p className="small quiet">
        Keys never act while you type in a field. On a Mac, the Command key serves for Ctrl. On a
        pin that has the focus, ← and → move its beat by a sample, with Shift by 10 ms. Your own
        keys are kept in this browser.
      </p>
      {found.length === 0 ? <p>No command has these words.</p> : null}
      <div className="keys-columns">
        {COMMAND_GROUPS.filter((group) => found.some((one) => one.group === group)).map((group) => (
          <section key={group} aria-labelledby={`keys-${group}`}>
            <h3 id={`keys-${group}`}>{GROUP_WORDS[group]}</h3>
            <dl className="keys-list">
              {found
                .filter((one) => one.group === group)
                .map((one) =>
                  changing ? (
                    <ChangeRow key={one.id} command={one} />
                  ) : (
                    <RunRow key={one.id} command={one} parts={parts} />
                  ),
                )}
            </dl>
          </section>
        ))}
      </div>
    </Dialog>
  );
}

/** The way back to the keys of the table, where any has been changed. */
function GivenKeys() {
  const { shell } = useApp();
  const own = useShell((state) => Object.keys(state.ownKeys).length);
  if (own === 0) return null;
  return (
    <button type="button" className="button" onClick={() => shell.getState().setOwnKeys({})}>
      Back to the given keys ({own} changed)
    </button>
  );
}

function RunRow({ command, parts }: PageProps & { readonly command: Command }) {
  const { shell } = useApp();
  const able = canRun(command, parts);
  return (
    <div data-command={command.id}>
      <dt>
        <button
          type="button"
          className="key-run"
          disabled={!able}
          title={able ? 'Do this now' : command.whyNot?.(parts) || 'Not possible now'}
          onClick={() => {
            flushSync(() => shell.getState().closeDialog());
            command.run(parts);
          }}
        >
          {command.words}
        </button>
      </dt>
      <Keys command={command} />
    </div>
  );
}

function Keys({ command }: { readonly command: Command }) {
  const plainKeys = useShell((state) => state.plainKeys);
  const ownKeys = useShell((state) => state.ownKeys);
  return (
    <dd>
      {keysOf(command, ownKeys).map((key) => (
        <kbd key={key} className={isPlainKey(key) && !plainKeys ? 'off' : undefined}>
          {keyWords(key)}
        </kbd>
      ))}
    </dd>
  );
}

/** No key by themselves. */
const MODIFIERS = /^(Control|Shift|Alt|AltGraph|Meta|CapsLock|Dead|Process|Unidentified)$/;

/** A command whose key is changed by pressing another; Escape or leaving it keeps the old one. */
function ChangeRow({ command }: { readonly command: Command }) {
  const { shell } = useApp();
  const ownKeys = useShell((state) => state.ownKeys);
  const [listening, setListening] = useState(false);
  const [fault, setFault] = useState<string | null>(null);
  const own = Object.hasOwn(ownKeys, command.id);
  const take = (key: string) => {
    const { [command.id]: _, ...others } = ownKeys;
    const given = command.keys.includes(key);
    const clash = keyFault(command, key, { commands: COMMANDS, ownKeys: others });
    setFault(clash);
    setListening(clash !== null);
    if (clash === null)
      shell.getState().setOwnKeys(given ? others : { ...others, [command.id]: key });
  };
  return (
    <div data-command={command.id} className="key-change">
      <dt>{command.words}</dt>
      <Keys command={command} />
      <dd className="key-acts">
        <button
          type="button"
          className="button slight"
          aria-label={
            listening
              ? `Press a key… to be the key of “${command.words}”; Escape leaves the old one`
              : `Change the key of “${command.words}”`
          }
          onClick={() => {
            setFault(null);
            setListening(!listening);
          }}
          onBlur={() => setListening(false)}
          onKeyDown={(event) => {
            if (!listening || event.key === 'Tab' || MODIFIERS.test(event.key)) return;
            event.preventDefault();
            event.stopPropagation();
            if (event.key === 'Escape') setListening(false);
            else take(keyName(event.nativeEvent));
          }}
        >
          {listening ? 'Press a key…' : 'Change'}
        </button>
        {own ? (
          <button
            type="button"
            className="button slight"
            aria-label={`Back to the given key of “${command.words}”`}
            onClick={() => take(command.keys[0])}
          >
            Given key
          </button>
        ) : null}
      </dd>
      {fault === null ? null : (
        <dd className="key-fault">
          <p className="field-error" role="alert">
            {fault}
          </p>
        </dd>
      )}
    </div>
  );
}
