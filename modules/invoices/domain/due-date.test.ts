import { describe, expect, it } from "vitest";
import { dueDate, termsText, type Terms } from "./due-date";

describe("due date", () => {
  it.each<[string, Terms, string, string]>([
    ["2026-03-13", { kind: "on receipt" }, "2026-03-13", "Due on receipt"],
    ["2026-09-30", { kind: "net", days: 30 }, "2026-10-30", "Net 30 days"],
    ["2026-03-06", { kind: "net", days: 15 }, "2026-03-21", "Net 15 days"],
    ["2028-02-05", { kind: "end of month", days: 0 }, "2028-02-29", "End of month"],
    ["2026-12-31", { kind: "end of month", days: 10 }, "2027-01-10", "End of month + 10 days"],
  ])("of %s, %o is %s", (issued, terms, due, words) => {
    expect(dueDate(issued, terms)).toBe(due);
    expect(termsText(terms)).toBe(words);
  });
});
