import { describe, expect, it } from "vitest";
import { proposedFinding, proposeFinding } from "./proposed-finding";

const [ONE, TWO] = ["11111111-1111-4111-8111-111111111111", "22222222-2222-4222-8222-222222222222"];
const read = (href: string, pieces: readonly string[] = [ONE, TWO]) => proposedFinding(new URL(href, "https://shop.example").searchParams, pieces);

describe("a finding proposed by another page", () => {
  it("comes through the address as it was written", () => {
    const finding = { pieceId: TWO, words: "Stem clearance, intake left: 0,08 mm & more, above 0.05 mm (manual 4-12).", position: "intake left" };
    expect(read(proposeFinding("/s/ninebark/orders/WO-2026-0118", finding))).toEqual(finding);
    expect(read(proposeFinding("/o", { ...finding, position: "" }))).toEqual({ ...finding, position: "" });
  });
  it("goes to the first head when its own is not of this order, and to none without a head", () => {
    expect(read(`/o?finding=Cracked&piece=${TWO}`, [ONE])).toMatchObject({ pieceId: ONE, words: "Cracked" });
    expect(read("/o?finding=Cracked", [ONE])).toMatchObject({ pieceId: ONE });
    expect(read("/o?finding=Cracked", [])).toBeNull();
  });
  it("is nothing without words, and no more than a finding takes", () => {
    expect(read("/o")).toBeNull();
    expect(read("/o?finding=%20%20")).toBeNull();
    expect(proposedFinding(null, [ONE])).toBeNull();
    const long = read(`/o?finding=${"x".repeat(3000)}&where=${"y".repeat(300)}%0A`);
    expect([long?.words.length, long?.position.length]).toEqual([1000, 60]);
    expect(read("/o?finding=a%00b%0Ac")?.words).toBe("a b c");
  });
});
