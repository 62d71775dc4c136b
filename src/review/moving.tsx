import './borders.css';
import { useStore } from 'zustand';
import { timeText } from '../units/typed-time';
import { acrossStrip } from './across-strip';
import { leftWhileMoving, type Moving } from './left-while-moving';
import { minutesText } from './minutes-left';
import type { PaneProps } from './pane-props';
import { PhaseBorders } from './phase-borders';

/** What stands over Whole study while an edge is moved: borders for the keys, and the time left in the phases it changes. */
export function MovingParts({ stores, act }: Pick<PaneProps, 'stores' | 'act'>) {
  const bordersShown = useStore(stores.view, (state) => state.bordersShown);
  const moving = useStore(stores.view, (state) => state.draft ?? state.phaseDraft);
  return (
    <>
      {bordersShown ? <PhaseBorders stores={stores} act={act} /> : null}
      {moving ? <TimeLeftBox stores={stores} moving={moving} /> : null}
    </>
  );
}

/** The moved time and the minutes of the phases beside the handle; those who hear it are told by the handle itself. */
function TimeLeftBox({
  stores,
  moving,
}: {
  readonly stores: PaneProps['stores'];
  readonly moving: Moving;
}) {
  const durationS = useStore(stores.view, (state) => state.durationS);
  const hidden = useStore(stores.view, (state) => state.identityHidden);
  const { atS, snap } = moving.moved;
  const rows = leftWhileMoving(stores, moving);
  const heart = rows.some(({ heartS }) => heartS !== null);
  const left = `clamp(170px, ${acrossStrip(atS, durationS)}, 100% - 170px)`;
  return (
    <div
      className={'spanId' in moving ? 'moving of-span' : 'moving'}
      style={{ left }}
      aria-hidden="true"
    >
      <strong>{timeText(atS)}</strong>
      {snap === null ? '' : ` at ${hidden ? 'an annotation or event' : `“${snap}”`}`}
      <span className="quiet">{snap === null ? '' : ' · Alt or Shift: no snapping'}</span>
      <table>
        <thead>
          <tr>
            <th>minutes</th>
            <th>of the phase</th>
            <th>kept, stomach</th>
            {heart ? <th>kept, heart</th> : null}
          </tr>
        </thead>
        <tbody>
          {rows.map(({ phase, lengthS, stomachS, heartS }) => (
            <tr key={phase}>
              <td>{phase}</td>
              <td>{minutesText(lengthS)}</td>
              <td>{minutesText(stomachS)}</td>
              {heartS === null ? null : <td>{minutesText(heartS)}</td>}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
