import { beginWork, endWork } from './idle';

/** Draws at most once a frame, however often it is asked; a draw that is due counts as work. */
export class FrameLoop {
  private due = 0;

  constructor(private readonly draw: () => void) {}

  readonly ask = (): void => {
    if (this.due !== 0) return;
    beginWork();
    this.due = requestAnimationFrame(() => {
      this.due = 0;
      try {
        this.draw();
      } finally {
        endWork();
      }
    });
  };

  stop(): void {
    if (this.due === 0) return;
    cancelAnimationFrame(this.due);
    this.due = 0;
    endWork();
  }
}
