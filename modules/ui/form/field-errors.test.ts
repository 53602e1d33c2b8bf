import { describe, expect, it } from "vitest";
import { errorAt, flattenErrors } from "./field-errors";

const tree = {
  phone: { type: "custom", message: "One digit short." },
  lines: [undefined, { qty: { type: "too_small", message: "At least 1.", ref: { focus: () => undefined } } }],
};

describe("errors of a form", () => {
  it("are found in lists too", () => {
    expect(flattenErrors(tree)).toEqual([
      { path: "phone", message: "One digit short." },
      { path: "lines.1.qty", message: "At least 1." },
    ]);
    expect(errorAt(tree, "lines.1.qty")).toBe("At least 1.");
    expect(errorAt(tree, "lines.0.qty")).toBeUndefined();
  });
  it("of the list itself count as well", () => {
    const root = Object.assign([] as unknown[], { root: { type: "too_small", message: "Add a line." } });
    expect(flattenErrors({ lines: root })).toEqual([{ path: "lines.root", message: "Add a line." }]);
  });
  it("are none in an empty tree", () => expect(flattenErrors({})).toEqual([]));
});
