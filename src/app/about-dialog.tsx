import { CAUTIONS, PRIVACY } from '../recording/cautions';
import { PROGRAM } from '../units/program';
import { useApp, useShell } from './app-context';
import { Dialog } from './dialog';
import { LIBRARIES } from './libraries';
import { THEME_CHOICES } from './preferences';

/** Version, cautions, theme, and what the page is built with. */
export function AboutDialog() {
  const { shell } = useApp();
  const theme = useShell((state) => state.theme);
  return (
    <Dialog
      title="About Bicadence"
      subtitle={`${PROGRAM}: two cadences, stomach and heart, in one record.`}
      onClose={() => shell.getState().closeDialog()}
    >
      <ul className="plain-list">
        {[...CAUTIONS, PRIVACY].map((caution) => (
          <li key={caution}>{caution}</li>
        ))}
      </ul>
      <fieldset className="choices">
        <legend>Theme</legend>
        {THEME_CHOICES.map((choice) => (
          <label key={choice} className="tick">
            <input
              type="radio"
              name="theme"
              checked={theme === choice}
              onChange={() => shell.getState().setTheme(choice)}
            />
            <span>{choice === 'system' ? 'as the system has it' : choice}</span>
          </label>
        ))}
      </fieldset>
      <table className="libraries">
        <caption>Libraries that ship with the page</caption>
        <thead>
          <tr>
            <th scope="col">Library</th>
            <th scope="col">Use</th>
            <th scope="col">Licence</th>
          </tr>
        </thead>
        <tbody>
          {LIBRARIES.map((library) => (
            <tr key={library.name}>
              <th scope="row">{library.name}</th>
              <td>{library.use}</td>
              <td>{library.licence}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </Dialog>
  );
}
