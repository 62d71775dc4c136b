import { useCommandLinks } from './command-links';
import type { LookCommands } from './look-commands';

/** Buttons that pan and zoom a pane, for those who neither wheel nor drag. */
export function PaneMoves({
  name,
  title,
  commands,
}: {
  readonly name: 'minutes' | 'seconds';
  readonly title: string;
  readonly commands: LookCommands;
}) {
  const { hint } = useCommandLinks();
  const minutes = name === 'minutes';
  const moves = [
    ['‹', 'earlier', 'left', minutes ? commands.minutesLeft : commands.secondsLeft],
    ['›', 'later', 'right', minutes ? commands.minutesRight : commands.secondsRight],
    ['+', 'closer', 'in', minutes ? commands.minutesIn : commands.secondsIn],
    ['−', 'wider', 'out', minutes ? commands.minutesOut : commands.secondsOut],
  ] as const;
  return (
    <div className="pane-moves">
      {moves.map(([sign, words, way, act]) => (
        <button
          type="button"
          key={words}
          title={hint(`${title}: ${words}`, `${name}-${way}`)}
          aria-label={`${title}: ${words}`}
          onClick={act}
        >
          {sign}
        </button>
      ))}
    </div>
  );
}
