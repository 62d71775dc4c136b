import { type PointerEvent, useEffect, useRef } from 'react';
import { useStore } from 'zustand';
import { liftPen, type Mark, movePenTo, type RoomStore, setPenDown } from './room-store';

/** The ring that follows the mouse, and the marks that are drawn over everything and fade. */
export function PenLayer({ room }: { readonly room: RoomStore }) {
  const penOn = useStore(room, (state) => state.penOn);
  const penDown = useStore(room, (state) => state.penDown);
  const ring = useStore(room, (state) => state.ring);
  const marks = useStore(room, (state) => state.marks);
  const layer = useRef<HTMLDivElement>(null);
  useEffect(() => {
    const follow = (event: globalThis.PointerEvent) =>
      movePenTo(room, { x: event.clientX, y: event.clientY });
    window.addEventListener('pointermove', follow);
    return () => window.removeEventListener('pointermove', follow);
  }, [room]);
  useEffect(() => {
    if (penOn) layer.current?.focus();
  }, [penOn]);
  const down = (event: PointerEvent<HTMLDivElement>) => {
    if (event.button !== 0) return;
    layer.current?.setPointerCapture(event.pointerId);
    movePenTo(room, { x: event.clientX, y: event.clientY });
    setPenDown(room);
  };
  return (
    <div
      ref={layer}
      className={penOn ? 'pen-layer on' : 'pen-layer'}
      role="application"
      aria-label="Pen"
      aria-hidden={!penOn}
      tabIndex={-1}
      onPointerDown={down}
      onPointerUp={() => liftPen(room)}
      onPointerCancel={() => liftPen(room)}
    >
      <svg aria-hidden="true">
        {marks.map((mark) => (
          <DrawnMark key={mark.id} mark={mark} />
        ))}
      </svg>
      {ring ? (
        <span
          className={penDown ? 'room-ring down' : 'room-ring'}
          style={{ transform: `translate(${ring.x}px, ${ring.y}px)` }}
        />
      ) : null}
    </div>
  );
}

function DrawnMark({ mark }: { readonly mark: Mark }) {
  const points = mark.points.map(({ x, y }) => `${x},${y}`).join(' ');
  const dot = mark.points.length === 1 ? ` ${mark.points[0].x + 0.1},${mark.points[0].y}` : '';
  return (
    <g className={mark.done ? 'mark done' : 'mark'}>
      <polyline className="mark-halo" points={points + dot} />
      <polyline className="mark-line" points={points + dot} />
    </g>
  );
}
