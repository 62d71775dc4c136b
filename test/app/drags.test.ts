import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { commandOf } from '../../src/app/commands';

/** Every drag of the panes, the commands that do the same by keys, and the field that does it by number. */
const DRAGS: Readonly<
  Record<string, { readonly keys: readonly string[]; readonly field: readonly [string, string] }>
> = {
  panGesture: {
    keys: ['seconds-left', 'seconds-right', 'minutes-left', 'minutes-right'],
    field: ['src/app/go-to-dialog.tsx', 'label="Time"'],
  },
  slotGesture: {
    keys: ['seconds-left', 'seconds-right', 'minutes-left', 'minutes-right'],
    field: ['src/app/go-to-dialog.tsx', 'label="Time"'],
  },
  slotEdgeGesture: {
    keys: ['seconds-in', 'seconds-out', 'minutes-in', 'minutes-out'],
    field: ['src/app/go-to-dialog.tsx', 'label="Width of Seconds"'],
  },
  stripPan: {
    keys: ['minutes-left', 'minutes-right', 'go-start', 'go-end'],
    field: ['src/app/go-to-dialog.tsx', 'label="Time"'],
  },
  drawSpanGesture: {
    keys: ['exclude-seconds', 'spans'],
    field: ['src/app/spans-dialog.tsx', 'TimeField'],
  },
  spanGesture: {
    keys: ['exclude-seconds', 'spans'],
    field: ['src/app/spans-dialog.tsx', 'TimeField'],
  },
  spanEndGesture: {
    keys: ['next-span', 'previous-span', 'spans'],
    field: ['src/review/span-end-field.tsx', 'role="spinbutton"'],
  },
  phaseEdgeGesture: {
    keys: ['phase-borders', 'phases'],
    field: ['src/app/phase-table.tsx', 'TimeField'],
  },
  borderGesture: {
    keys: ['phase-borders', 'phases'],
    field: ['src/app/phase-table.tsx', 'TimeField'],
  },
  edgeGesture: {
    keys: ['phase-borders', 'phases'],
    field: ['src/app/phase-table.tsx', 'TimeField'],
  },
  pinGesture: {
    keys: ['beat-sample-left', 'beat-sample-right', 'beat-10-left', 'beat-10-right'],
    field: ['src/review/beat-bar.tsx', 'Beat at'],
  },
  bandGesture: {
    keys: ['extend-later', 'extend-earlier', 'beats-in-view'],
    field: ['src/app/beats-between-dialog.tsx', 'RangeFields'],
  },
};

/** Names of the functions and methods that return a gesture. */
function gesturesInCode(): readonly string[] {
  const files = readdirSync('src/review', { encoding: 'utf8' }).filter((file) =>
    /\.tsx?$/.test(file),
  );
  return files.flatMap((file) => {
    const text = readFileSync(`src/review/${file}`, 'utf8');
    return [...text.matchAll(/(\w+)\(([^;{}]*?)\): Gesture(?: \| null)? \{/g)].flatMap(
      ([whole]) => {
        const name = /^(?:function )?(\w+)\(/.exec(whole)?.[1];
        return name ? [name] : [];
      },
    );
  });
}

describe('every drag of the panes', () => {
  it('is in the table', () => {
    const found = [...new Set(gesturesInCode())];
    expect(found.length).toBeGreaterThan(8);
    expect(found.filter((name) => !(name in DRAGS))).toEqual([]);
    expect(Object.keys(DRAGS).filter((name) => !found.includes(name))).toEqual([]);
  });

  it.each(Object.entries(DRAGS))('%s is done by keys and by a field too', (_, { keys, field }) => {
    for (const id of keys) expect(commandOf(id).keys.length, id).toBeGreaterThan(0);
    const [file, words] = field;
    expect(readFileSync(file, 'utf8')).toContain(words);
  });

  it('is all there is: the pointer is followed in the panes’ stage and by the pen of the room view, which has keys of its own', () => {
    const all = readdirSync('src', { recursive: true, encoding: 'utf8' })
      .filter((file) => /\.tsx?$/.test(file))
      .filter((file) =>
        /pointermove|onPointerMove|onMouseMove|draggable/.test(readFileSync(`src/${file}`, 'utf8')),
      );
    expect(all.filter((file) => !/^(review\/stage\.ts|app\/room\/)/.test(file))).toEqual([]);
  });
});
