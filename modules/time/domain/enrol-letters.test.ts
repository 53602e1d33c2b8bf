import { describe, expect, it } from "vitest";
import { codeFrom } from "./enrol-letters";

describe("an enrolment code", () => {
  it("has eight readable letters", () => expect(codeFrom(Uint8Array.from([0, 1, 2, 29, 30, 31, 239, 8]))).toBe("234Z-23ZA"));
  it("passes over bytes that would favour some letters", () => expect(codeFrom(Uint8Array.from([255, 240, 0, 0, 0, 0, 0, 0, 0, 0]))).toBe("2222-2222"));
  it("wants enough bytes", () => expect(() => codeFrom(Uint8Array.from([255, 1]))).toThrow(RangeError));
});
