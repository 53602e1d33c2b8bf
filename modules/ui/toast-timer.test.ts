import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { Countdown } from "./toast-timer";

describe("a toast's time", () => {
  beforeEach(() => vi.useFakeTimers());
  afterEach(() => vi.useRealTimers());
  const start = (ms: number) => {
    const done = vi.fn();
    return { done, c: new Countdown(ms, done, () => Date.now()) };
  };

  it("runs out once", () => {
    const { c, done } = start(1000);
    c.run();
    c.run();
    vi.advanceTimersByTime(999);
    expect(done).not.toHaveBeenCalled();
    vi.advanceTimersByTime(1);
    expect(done).toHaveBeenCalledTimes(1);
    vi.advanceTimersByTime(5000);
    expect(done).toHaveBeenCalledTimes(1);
  });
  it("stands still while held and goes on with what was left", () => {
    const { c, done } = start(1000);
    c.run();
    vi.advanceTimersByTime(600);
    c.hold();
    vi.advanceTimersByTime(60_000);
    expect(done).not.toHaveBeenCalled();
    c.run();
    vi.advanceTimersByTime(399);
    expect(done).not.toHaveBeenCalled();
    vi.advanceTimersByTime(1);
    expect(done).toHaveBeenCalledTimes(1);
  });
});
