import { describe, expect, it } from "vitest";
import { NINEBARK } from "@/seed/facts/ninebark";
import { ROLE_WORDS, roleWords, shortRoleWords } from "./role-words";

describe("what a person is in the shop", () => {
  it("is told in full: whoever receives and also works at a bench is both", () => {
    const emeka = NINEBARK.people.find((p) => p.shortName === "Emeka")?.roles ?? [];
    expect(roleWords(emeka)).toBe("Receiving and shipping, Technician");
    expect(shortRoleWords(emeka)).toBe("Receiving, Technician");
  });
  it("has a word without a comma for every role, and a short one that no other role has", () => {
    for (const [, word] of ROLE_WORDS) expect(word).not.toContain(",");
    const short = ROLE_WORDS.map(([role]) => shortRoleWords([role]));
    expect(new Set(short).size).toBe(ROLE_WORDS.length);
  });
  it("is nothing for nobody", () => expect(roleWords([])).toBe(""));
});
