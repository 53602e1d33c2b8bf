import { describe, expect, it } from "vitest";
import { shareMinutes } from "./share-minutes";

describe("one setup over several heads", () => {
  it.each([
    [100, { by: "equal", pieces: 3 }, [34, 33, 33]],
    [47, { by: "equal", pieces: 2 }, [24, 23]],
    [50, { by: "book", bookMinutes: [60, 30, 30] }, [25, 13, 12]],
    [7, { by: "book", bookMinutes: [0, 0] }, [4, 3]],
    [47, { by: "typed", minutes: [40, 7] }, [40, 7]],
  ] as const)("%i min, %o -> %o", (interval, basis, shares) => {
    expect(shareMinutes(interval, basis)).toEqual({ ok: true, value: shares });
  });

  it("refuses typed shares that do not add up, and says by how much", () => {
    expect(shareMinutes(47, { by: "typed", minutes: [40, 10] })).toMatchObject({
      ok: false, refusal: { code: "SHARES_DO_NOT_ADD_UP", field: "minutes", data: { differenceMinutes: 3 } },
    });
    expect(shareMinutes(10, { by: "typed", minutes: [12, -2] })).toMatchObject({ ok: false });
    expect(shareMinutes(10, { by: "typed", minutes: [4.5, 5.5] })).toMatchObject({ ok: false });
  });

  it("refuses to share over nothing", () => {
    expect(shareMinutes(47, { by: "equal", pieces: 0 })).toMatchObject({ ok: false, refusal: { code: "NO_PIECES" } });
  });
});
