/** How long a toast stays, ms. With an Undo it stays longer, so that there is time to read and to act. */
export const TOAST_MS = 6_000;
export const TOAST_UNDO_MS = 10_000;

/** A countdown that can be held while the toast is hovered or focused and goes on with what was left. */
export class Countdown {
  private left: number;
  private startedAt: number | null = null;
  private timer: ReturnType<typeof setTimeout> | null = null;

  constructor(
    ms: number,
    private readonly done: () => void,
    private readonly clock: () => number = () => performance.now(),
  ) {
    this.left = ms;
  }

  run(): void {
    if (this.timer !== null) return;
    this.startedAt = this.clock();
    this.timer = setTimeout(this.done, this.left);
  }

  hold(): void {
    if (this.timer === null) return;
    clearTimeout(this.timer);
    this.timer = null;
    this.left = Math.max(0, this.left - (this.clock() - (this.startedAt ?? this.clock())));
  }
}
