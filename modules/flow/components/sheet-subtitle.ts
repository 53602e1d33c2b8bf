import type { FlowSheet } from "../queries/sheet";

const PURPOSE = { baseline: "Before test", after: "Check test after porting", interim: "Pass in between", check: "Check test" } as const;

/** `Odalys Brennan, S250-4V. Before test, June.` */
export function sheetSubtitle(sheet: FlowSheet): string {
  const { head, tests } = sheet;
  const inHand = tests.filter((t) => t.state === "draft").at(-1) ?? tests.filter((t) => t.state === "complete").at(-1);
  const who = [head.customerName, head.family, head.castingNumber && `casting ${head.castingNumber}`].filter(Boolean).join(", ");
  return `${who}.${inHand ? ` ${PURPOSE[inHand.purpose]}, ${inHand.operator.name}.` : ""}`;
}
