import { describe, expect, it } from "vitest";
import { parseAddress } from "./address";

describe("an e-mail address", () => {
  it.each([
    ["  Dana.Ortiz+heads@Example.COM ", "Dana.Ortiz+heads@example.com"],
    ["a@b.co", "a@b.co"],
    ["o'brien@xn--mnchen-3ya.example", "o'brien@xn--mnchen-3ya.example"],
    [`${"x".repeat(64)}@example.com`, `${"x".repeat(64)}@example.com`],
  ])("takes %j", (text, address) => {
    expect(parseAddress(text)).toEqual({ ok: true, value: address });
  });

  it.each([
    ["", "missing"],
    ["dana", "@ is missing"],
    ["dana@localhost", "not a domain"],
    ["dana@10.0.0.1", "not a domain"],
    ["dana@[10.0.0.1]", "one person"],
    ["dana@example..com", "not a domain"],
    ["dana@-example.com", "not a domain"],
    [".dana@example.com", "before the @"],
    ["da..na@example.com", "before the @"],
    [`${"x".repeat(65)}@example.com`, "before the @"],
    [`${"x".repeat(60)}@${"y.".repeat(100)}com`, "254"],
    ["a@example.com,b@example.com", "one person"],
    ["a@example.com b@example.com", "one person"],
    ["Dana <dana@example.com>", "one person"],
    ["heads:a@example.com;", "one person"],
    ["dana(counter)@example.com", "one person"],
    ['"dana x"@example.com', "one person"],
    ['"a@evil.example "@example.com', "one person"],
    ["a@b@example.com", "more than one @"],
    ["dana@example.com\r\nBcc: all@example.com", "single line"],
    ["dana@example.com\n", "single line"],
    ["dana＠example.com", "letter"],
    ["dаna@example.com", "letter"],
  ])("refuses %j and says what would fit", (text, why) => {
    const result = parseAddress(text);
    expect(result.ok).toBe(false);
    if (result.ok) return;
    expect(result.refusal.message).toContain(why);
    expect(result.refusal.message).toContain("name@example.com");
  });
});
