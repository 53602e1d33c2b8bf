import { describe, expect, it } from "vitest";
import { benchTokenFrom } from "./bench-token";

describe("the token of a bench computer", () => {
  it("is the URL-safe base64 of its bytes without filling (RFC 4648 section 5)", () => {
    for (const bytes of [new Uint8Array(32), new Uint8Array(32).fill(255), Uint8Array.from({ length: 32 }, (_, i) => i * 7 + 3)]) {
      const token = benchTokenFrom(bytes);
      expect(token).toBe(Buffer.from(bytes).toString("base64url"));
      expect(token).toMatch(/^[\w-]{43}$/);
    }
  });
  it("takes 32 bytes and no fewer", () => expect(() => benchTokenFrom(new Uint8Array(31))).toThrow(RangeError));
});
