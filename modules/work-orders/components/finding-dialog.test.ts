import { describe, expect, it } from "vitest";
import { findingInput } from "../input";
import { findingDraft, findingValues } from "./finding-dialog";

const [ONE, TWO] = ["11111111-1111-4111-8111-111111111111", "22222222-2222-4222-8222-222222222222"];
const pieces = [{ id: ONE, label: "260224-07", declaredMinor: null }, { id: TWO, label: "260224-08", declaredMinor: null }];
const proposed = { pieceId: TWO, words: "Stem clearance, intake left: 0.08 mm, above 0.05 mm.", position: "intake left" };

describe("the finding dialog", () => {
  it("begins with what was proposed, ready to send", () => {
    expect(findingValues(pieces, proposed)).toEqual({ ...proposed, goOnMeanwhile: true });
    expect(findingInput.safeParse(findingValues(pieces, proposed)).success).toBe(true);
  });
  it("begins empty with the first head without a proposal", () => {
    expect(findingValues(pieces, null)).toEqual({ pieceId: ONE, words: "", position: "", goOnMeanwhile: true });
  });
  it("keeps what is changed under the proposal it was changed in", () => {
    const names = [findingDraft(pieces, null), findingDraft(pieces, proposed), findingDraft(pieces, { ...proposed, words: "Another." })];
    expect(new Set(names).size).toBe(3);
    expect(findingDraft(pieces, { ...proposed })).toBe(names[1]);
  });
});
