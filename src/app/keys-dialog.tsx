import { useApp, useShell } from './app-context';
import { COMMAND_GROUPS, GROUP_WORDS } from './command';
import { COMMANDS } from './commands';
import { Dialog } from './dialog';
import { Tick } from './fields';
import { isPlainKey, keyWords } from './key-names';

/** Every command with its keys, from the one table, and the switch for keys that are a single character. */
export function KeysDialog() {
  const { shell } = useApp();
  const plainKeys = useShell((state) => state.plainKeys);
  return (
    <Dialog title="Keys" size="large" onClose={() => shell.getState().closeDialog()}>
      <Tick
        label="Keys of a single letter, digit or sign act (with Shift or without)"
        checked={plainKeys}
        onChange={(on) => shell.getState().setPlainKeys(on)}
      />
      <p className="small quiet">
        Keys never act while you type in a field. On a Mac, the Command key serves for Ctrl.
      </p>
      <div className="keys-columns">
        {COMMAND_GROUPS.map((group) => (
          <section key={group} aria-labelledby={`keys-${group}`}>
            <h3 id={`keys-${group}`}>{GROUP_WORDS[group]}</h3>
            <dl className="keys-list">
              {COMMANDS.filter((one) => one.group === group).map((one) => (
                <div key={one.id}>
                  <dt>{one.words}</dt>
                  <dd>
                    {one.keys.map((key) => (
                      <kbd key={key} className={isPlainKey(key) && !plainKeys ? 'off' : undefined}>
                        {keyWords(key)}
                      </kbd>
                    ))}
                  </dd>
                </div>
              ))}
            </dl>
          </section>
        ))}
      </div>
    </Dialog>
  );
}
