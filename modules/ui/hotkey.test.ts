import { describe, expect, it } from "vitest";
import { matches, parseCombo } from "./hotkey";

const press = (key: string, more: Partial<Parameters<typeof matches>[1]> = {}) => ({ key, code: "", altKey: false, ctrlKey: false, metaKey: false, shiftKey: false, ...more });

describe("page-wide keys", () => {
  it.each(["F2", "F9", "F12", "Alt+1", "Ctrl+P", "Ctrl+Shift+K"])("%s may act", (c) => expect(() => parseCombo(c)).not.toThrow());
  // WCAG 2.2, 2.1.4 Character Key Shortcuts.
  it.each(["M", "1", "?", "Shift+M", "F13", ""])("%s alone may not", (c) => expect(() => parseCombo(c)).toThrow(RangeError));

  it("tells held keys apart", () => {
    const f4 = parseCombo("F4");
    expect(matches(f4, press("F4"))).toBe(true);
    expect(matches(f4, press("F4", { altKey: true }))).toBe(false);
    expect(matches(f4, press("F4", { shiftKey: true }))).toBe(false);
    expect(matches(f4, press("F5"))).toBe(false);
  });
  it("knows a digit by its place when Alt types another sign", () => {
    const one = parseCombo("Alt+1");
    expect(matches(one, press("¡", { altKey: true, code: "Digit1" }))).toBe(true);
    expect(matches(one, press("1", { code: "Digit1" }))).toBe(false);
    expect(matches(one, press("2", { altKey: true, code: "Digit2" }))).toBe(false);
  });
  it("takes the command key for Ctrl", () => {
    expect(matches(parseCombo("Ctrl+P"), press("p", { metaKey: true }))).toBe(true);
  });
});
