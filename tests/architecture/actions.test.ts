import { describe, expect, it } from "vitest";
import { sources, textOf } from "./sources";

// Read as text: an actions file cannot be loaded outside the server's bundler.
const files = sources("modules").concat(sources("app")).filter((f) => /^\s*["']use server["']/.test(textOf(f)));

describe("server actions", () => {
  it("are found", () => expect(files.length).toBeGreaterThan(3));
  it.each(files)("%s exports only actions made by the wrapper", (file) => {
    const text = textOf(file);
    const exported = [...text.matchAll(/^export\s+(?:async\s+)?(?:const|function|let|class|default)\s*([\w$]*)(.*)$/gm)];
    expect(exported.length).toBeGreaterThan(0);
    for (const [line, , rest] of exported) // A plain form's action hands what was typed to an action that the wrapper made, and carries its mark.
      expect(rest, line).toMatch(/\[ACTION_MARK\]: (\w+)\[ACTION_MARK\]/.test(text) && /= secretAction\(/.test(text) ? /^\s*=\s*(shopAction\(|secretAction\(|Object\.assign\()/ : /^\s*=\s*(shopAction|secretAction)\(/);
    expect(text).not.toMatch(/^export\s*\{/m);
  });
  it("stand in files of their own, never inline", () => {
    const inline = sources("modules").concat(sources("app")).filter((f) => !/^\s*["']use server["']/.test(textOf(f)) && /^\s+["']use server["'];/m.test(textOf(f)));
    expect(inline).toEqual([]);
  });
});
