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
  const minutes = name === 'minutes';
  const moves = [
    ['‹', 'earlier', minutes ? commands.minutesLeft : commands.secondsLeft],
    ['›', 'later', minutes ? commands.minutesRight : commands.secondsRight],
    ['+', 'closer', minutes ? commands.minutesIn : commands.secondsIn],
    ['−', 'wider', minutes ? commands.minutesOut : commands.secondsOut],
  ] as const;
  return (
    <div className="pane-moves">
      {moves.map(([sign, words, act]) => (
        <button
          type="button"
          key={words}
          title={`${title}: ${words}`}
          aria-label={`${title}: ${words}`}
          onClick={act}
        >
          {sign}
        </button>
      ))}
    </div>
  );
}
