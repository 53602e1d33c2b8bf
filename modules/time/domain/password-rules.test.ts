import { describe, expect, it } from "vitest";
import { passwordProblem } from "./password-rules";

describe("a password", () => {
  it.each(["short", "fourteen chars", "aaaaaaaaaaaaaaaaaaaa", "password password", "1234567890 1234567890", "Ninebark Headworks", "correct horse battery staple"])("%j is refused", (p) => expect(passwordProblem(p, ["Ninebark Headworks"])).not.toBeNull());
  it.each(["valve keepers hold", "röd stuga vid sjön", "eins zwei polizei 🚓 drei"])("%j is taken", (p) => expect(passwordProblem(p, ["Ninebark Headworks"])).toBeNull());
  it("counts characters, not bytes", () => expect(passwordProblem("éàüöñç日本語あい")).toMatch(/This has 11/));
});
