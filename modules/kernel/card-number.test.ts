import { describe, expect, it } from "vitest";
import { holdsCardNumber, passesLuhn } from "./card-number";

describe("card numbers in free text", () => {
  // 79927398713 is the widely published worked example of the check digit test; the 4111... number is a public test number.
  it("tests the check digit", () => {
    expect(passesLuhn("79927398713")).toBe(true);
    for (const d of "012456789") expect(passesLuhn(`7992739871${d}`)).toBe(false);
    expect(passesLuhn("")).toBe(false);
  });

  it.each([
    ["card 4111 1111 1111 1111 exp 12/28", true],
    ["4111-1111-1111-1111", true],
    ["4111111111111111", true],
    ["378282246310005", true],
    ["ring 1234567 4111 1111 1111 1111", true],
    ["4111 1111 1111 1112", false],
    ["79927398713", false],
    ["call 970 555 0142, tag 260224-07", false],
    ["RF18 5390 0754 7034", false],
    ["RF95NB202600318, card 4111 1111 1111 1111", true],
    ["", false],
  ])("%s: %s", (text, holds) => expect(holdsCardNumber(text)).toBe(holds));
});
