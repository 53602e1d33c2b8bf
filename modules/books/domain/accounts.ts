export type AccountKind = "asset" | "liability" | "equity" | "income" | "expense";

/** Chart of accounts every shop begins with. Names may be edited; the posting rules go by code. */
export const ACCOUNTS = [
  { code: "1000", name: "Cash drawer", kind: "asset" },
  { code: "1010", name: "Bank", kind: "asset" },
  { code: "1020", name: "Card clearing", kind: "asset" },
  { code: "1100", name: "Receivable", kind: "asset" },
  { code: "1200", name: "Parts stock", kind: "asset" },
  { code: "1210", name: "Cores", kind: "asset" },
  { code: "1220", name: "Goods in transit", kind: "asset" },
  { code: "1250", name: "Work in process, parts", kind: "asset" },
  { code: "1300", name: "Supplier core deposits", kind: "asset" },
  { code: "2000", name: "Payable", kind: "liability" },
  { code: "2050", name: "Goods received, not invoiced", kind: "liability" },
  { code: "2100", name: "Customer deposits", kind: "liability" },
  { code: "2110", name: "Customer credits", kind: "liability" },
  { code: "2200", name: "Sales tax payable", kind: "liability" },
  { code: "2300", name: "Payroll clearing", kind: "liability" },
  { code: "3000", name: "Equity", kind: "equity" },
  { code: "4000", name: "Labor", kind: "income" },
  { code: "4100", name: "Parts", kind: "income" },
  { code: "4150", name: "Shop supplies", kind: "income" },
  { code: "4200", name: "Freight", kind: "income" },
  { code: "4300", name: "Outside service", kind: "income" },
  { code: "4400", name: "Core charges", kind: "income" },
  { code: "4900", name: "Discounts", kind: "income" },
  { code: "5000", name: "Cost of parts", kind: "expense" },
  { code: "5050", name: "Purchase price variance", kind: "expense" },
  { code: "5100", name: "Outside service cost", kind: "expense" },
  { code: "5200", name: "Freight out", kind: "expense" },
  { code: "5300", name: "Warranty cost", kind: "expense" },
  { code: "5400", name: "Scrap and count differences", kind: "expense" },
  { code: "5500", name: "Development", kind: "expense" },
  { code: "6100", name: "Payment fees", kind: "expense" },
  { code: "6150", name: "Dispute fees", kind: "expense" },
  { code: "6200", name: "Bad debt", kind: "expense" },
  { code: "6300", name: "Cash over and short", kind: "expense" },
] as const satisfies readonly { readonly code: string; readonly name: string; readonly kind: AccountKind }[];

export type AccountCode = (typeof ACCOUNTS)[number]["code"];
export type Account = (typeof ACCOUNTS)[number];

const byCode: ReadonlyMap<string, Account> = new Map(ACCOUNTS.map((a) => [a.code, a]));
/** The account of a code, or undefined when the chart has none. */
export const accountOf = (code: string): Account | undefined => byCode.get(code);
