import { describe, expect, it } from "vitest";
import { leftOutWords, statedPressures, type StatedColumn } from "./one-pressure";

const column = (name: string, atInH2O: number, day: number, isRead = true): StatedColumn => ({ name, atInH2O, startedAt: `2026-03-${String(day).padStart(2, "0")}T10:00:00.000Z`, isRead });

describe("flows at different pressures", () => {
  const before = [column("intake before", 28, 1), column("exhaust before", 28, 1)];
  const after = [column("intake after", 10, 9), column("exhaust after", 10, 9, false)];
  it("are drawn at the newest test's that was read", () => {
    expect(statedPressures([...before, ...after])).toEqual([10, 28]);
    expect(statedPressures([...before, column("intake after", 10, 9, false)])).toEqual([28]);
    expect(statedPressures([])).toEqual([]);
  });
  it("name what is left out, and nothing where all stand at one", () => {
    expect(leftOutWords([...before, ...after], 10, String)).toBe("Drawn at 10 in H₂O. Not on this axis: intake before at 28, exhaust before at 28 in H₂O.");
    expect(leftOutWords(before, 28, String)).toBe("");
  });
});
