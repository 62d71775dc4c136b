import { beatWords, openBeats } from './open-beats';
import type { PaneCommands } from './pane-commands';
import type { PaneView } from './pane-view';
import { PIN_Y_PX, pinsInView } from './seconds-paint';
import { pinKey } from './seconds-view';

const MOST_BUTTONS = 60;
const HALF_PX = 12;

interface Held {
  readonly button: HTMLButtonElement;
  words: string;
}

/**
 * Buttons of 24 px over the pins, so that each has a name, focus and keys. Above 60 pins there are none: the drawing itself
 * takes the keys. The heads are painted below them.
 */
export class PinButtons {
  private readonly held = new Map<number, Held>();
  private followsFocus = false;

  constructor(
    private readonly layer: HTMLElement,
    private readonly commands: PaneCommands,
  ) {}

  /** Puts a button on every pin of the window; called after each draw. */
  place(view: PaneView): void {
    const open = openBeats(view.stores);
    const inside = pinsInView(view, null).filter(({ x }) => x >= 0 && x <= view.widthPx);
    const pins = open && inside.length <= MOST_BUTTONS ? inside : [];
    const kept = new Set(pins.map((pin) => pin.tick));
    const focused = document.activeElement;
    for (const [tick, { button }] of this.held) {
      if (kept.has(tick)) continue;
      if (button === focused) this.followsFocus = true;
      button.remove();
      this.held.delete(tick);
    }
    this.layer.tabIndex = pins.length > 0 ? -1 : 0;
    const tabStop = pins.find((pin) => pin.selected)?.tick ?? pins[0]?.tick;
    let before: HTMLButtonElement | null = null;
    for (const pin of pins) {
      const held: Held = this.held.get(pin.tick) ?? this.make(pin.tick, before);
      before = held.button;
      const words = open ? beatWords(open, pin.index) : '';
      if (words !== held.words) {
        held.words = words;
        held.button.setAttribute('aria-label', words);
      }
      held.button.setAttribute('aria-pressed', String(pin.selected));
      held.button.tabIndex = pin.tick === tabStop ? 0 : -1;
      held.button.style.transform = `translate(${pin.x - HALF_PX}px, ${PIN_Y_PX - HALF_PX}px)`;
    }
    this.carryFocus(pins.find((pin) => pin.selected)?.tick);
  }

  /** Focuses the pin at a tick, where it has a button. */
  focus(tick: number): void {
    this.held.get(tick)?.button.focus({ preventScroll: true });
  }

  /** A pin that was moved or deleted hands the focus to the one selected now; while pins have it, it follows the selection. */
  private carryFocus(selected: number | undefined): void {
    const onPin = [...this.held.values()].some(({ button }) => button === document.activeElement);
    if (selected === undefined || !(this.followsFocus || onPin)) return;
    this.followsFocus = false;
    const target = this.held.get(selected)?.button;
    if (target && target !== document.activeElement) target.focus({ preventScroll: true });
  }

  /** A button after that of the beat before it, so that they are read in the order of time. */
  private make(tick: number, before: HTMLButtonElement | null): Held {
    const button = document.createElement('button');
    button.type = 'button';
    button.className = 'pin';
    button.addEventListener('click', (event) => {
      if (event.detail === 0) this.commands.selectBeat(tick, event.shiftKey);
    });
    button.addEventListener('focus', () => {
      if (button.getAttribute('aria-pressed') === 'false' && button.matches(':focus-visible'))
        this.commands.selectBeat(tick, false);
    });
    button.addEventListener('keydown', (event) => {
      if (!pinKey(this.commands, event)) return;
      event.preventDefault();
      event.stopPropagation();
    });
    if (before) before.after(button);
    else this.layer.prepend(button);
    const held = { button, words: '' };
    this.held.set(tick, held);
    return held;
  }

  destroy(): void {
    for (const { button } of this.held.values()) button.remove();
    this.held.clear();
  }
}
