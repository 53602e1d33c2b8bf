import { expect, it } from "vitest";
import { misplaced } from "./plant.mjs";

it("finds the place of every planted mistake in the sources as they are", () => {
  expect(misplaced()).toEqual([]);
});
