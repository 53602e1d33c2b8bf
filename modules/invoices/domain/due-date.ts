import { addDays } from "@/modules/kernel/instant";

/** Payment terms. A due date on a weekend stays where it is. */
export type Terms =
  | { readonly kind: "on receipt" }
  | { readonly kind: "net"; readonly days: number }
  | { readonly kind: "end of month"; readonly days: number };

/** Due date `YYYY-MM-DD` of a document issued on `issued`. `days` are whole and 0 or more. */
export function dueDate(issued: string, terms: Terms): string {
  switch (terms.kind) {
    case "on receipt":
      return issued;
    case "net":
      return addDays(issued, terms.days);
    case "end of month":
      return addDays(lastOfMonth(issued), terms.days);
  }
}

/** In words for the document. */
export function termsText(terms: Terms): string {
  switch (terms.kind) {
    case "on receipt":
      return "Due on receipt";
    case "net":
      return `Net ${terms.days} days`;
    case "end of month":
      return terms.days === 0 ? "End of month" : `End of month + ${terms.days} days`;
  }
}

function lastOfMonth(date: string): string {
  const [year = 0, month = 1] = date.split("-").map(Number);
  const next = month === 12 ? `${year + 1}-01-01` : `${year}-${String(month + 1).padStart(2, "0")}-01`;
  return addDays(next, -1);
}
