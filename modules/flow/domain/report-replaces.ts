import type { PortSide } from "./comparison-reasons";
import type { RawTest } from "./raw-test";

/** The report that a newer one stands in for, and why. */
export interface ReplacedReport {
  readonly comparisonNo: number;
  readonly issuedAt: string;
  readonly why: string;
}

/** Why a correcting test was made, as its first note says; empty where it does not. */
const reasonOf = (test: Pick<RawTest, "notes">): string => /^Corrects run \d+: (.*)$/m.exec(test.notes)?.[1]?.trim() ?? "";

/**
 * Why a report is issued again, in words: every test it rests on that the last one did not, or what else differs.
 * @param last ids of the tests under the last report.
 */
export function replacedWhy(tests: readonly (Pick<RawTest, "id" | "purpose" | "notes" | "correctsTestId"> & { readonly side: PortSide })[], last: { readonly testIds: readonly string[]; readonly isReworded: boolean }): string {
  const fresh = tests.filter((t) => !last.testIds.includes(t.id)).map((t) => {
    const name = `${t.side} ${t.purpose === "baseline" ? "before" : "after"}`;
    if (t.correctsTestId === null) return last.testIds.length > 0 ? `${name} flowed since` : name;
    const reason = reasonOf(t);
    return `${name} corrected${reason === "" ? "" : ` (${reason.replace(/\.$/, "")})`}`;
  });
  const gone = last.testIds.length > 0 && fresh.length === 0 && tests.length < last.testIds.length ? ["a test was put out of use"] : [];
  const words = [...fresh, ...gone, ...(last.isReworded ? ["words to the customer changed"] : [])];
  return words.length > 0 ? words.join("; ") : "what is said of the noise or the cam changed";
}
