/** Roles a person may hold in a shop. One person may hold several. */
export const ROLES = ["counter", "technician", "lead", "inspector", "receiving", "bookkeeper", "manager", "owner", "accountant"] as const;
export type Role = (typeof ROLES)[number];

const ALL_STAFF: readonly Role[] = ["counter", "technician", "lead", "inspector", "receiving", "bookkeeper", "manager", "owner"];

/** Who may do what. Common practice of the trade, no published source; the shop's owner answers for it. */
const MATRIX = {
  "floor.see": [...ALL_STAFF],
  "orders.see": [...ALL_STAFF],
  "orders.open": ["counter", "lead", "bookkeeper", "manager", "owner"],
  "customers.see": ["counter", "lead", "receiving", "bookkeeper", "manager", "owner"],
  "customers.write": ["counter", "lead", "bookkeeper", "manager", "owner"],
  "estimate.write": ["counter", "lead", "bookkeeper", "manager", "owner"],
  "estimate.send": ["counter", "lead", "manager", "owner"],
  "approval.enter": ["counter", "lead", "manager", "owner"],
  "discount.large": ["manager", "owner"],
  "menu.write": ["manager", "owner"],
  "prices.see": ["counter", "lead", "bookkeeper", "manager", "owner"],
  "cost.see": ["bookkeeper", "manager", "owner"],
  "pieces.receive": ["counter", "lead", "receiving", "technician", "inspector", "manager", "owner"],
  "files.add": [...ALL_STAFF],
  "work.record": ["technician", "lead", "inspector", "receiving", "manager", "owner"],
  "work.override": ["lead", "manager", "owner"],
  "finding.record": ["technician", "lead", "inspector", "receiving", "manager", "owner"],
  "release": ["lead", "inspector", "manager", "owner"],
  "ship": ["counter", "lead", "receiving", "manager", "owner"],
  "handover.unpaid": ["manager", "owner"],
  "clock.use": [...ALL_STAFF],
  // What an enrolled tablet may still do once it is put out of use: hand over the times it kept.
  "clock.punch": [...ALL_STAFF],
  "time.see-own": [...ALL_STAFF],
  "time.see-all": ["lead", "bookkeeper", "manager", "owner"],
  "time.correct": ["lead", "bookkeeper", "manager", "owner"],
  "pay.see": ["bookkeeper", "owner"],
  "pay.write": ["owner"],
  "stock.see": [...ALL_STAFF],
  "stock.issue": ["counter", "technician", "lead", "receiving", "manager", "owner"],
  "stock.adjust": ["receiving", "bookkeeper", "manager", "owner"],
  "stock.write-off": ["manager", "owner"],
  "parts.write": ["counter", "lead", "receiving", "bookkeeper", "manager", "owner"],
  "purchase.see": ["counter", "lead", "receiving", "bookkeeper", "manager", "owner"],
  "purchase.write": ["counter", "lead", "bookkeeper", "manager", "owner"],
  "goods.receive": ["lead", "receiving", "manager", "owner"],
  "flow.see": [...ALL_STAFF],
  "flow.record": ["technician", "lead", "inspector", "receiving", "manager", "owner"],
  "flow.set-up": ["lead", "inspector", "manager", "owner"],
  "flow.issue": ["technician", "lead", "inspector", "manager", "owner"],
  "books.see": ["bookkeeper", "manager", "owner", "accountant"],
  "invoice.write": ["bookkeeper", "manager", "owner"],
  "credit.write": ["bookkeeper", "manager", "owner"],
  "payment.take": ["counter", "bookkeeper", "owner"],
  "refund": ["bookkeeper", "manager", "owner"],
  "bank.match": ["bookkeeper", "owner"],
  "journal.manual": ["bookkeeper", "owner"],
  "profit.see": ["bookkeeper", "manager", "owner"],
  "people.write": ["owner"],
  "devices.write": ["manager", "owner"],
  "settings.write": ["owner"],
  "audit.see": ["manager", "owner"],
  // Acts of others than staff.
  "customer.approve": [],
  "customer.pay": [],
  "system.run": [],
} as const satisfies Record<string, readonly Role[]>;

export type Act = keyof typeof MATRIX;

export type Actor =
  | { readonly kind: "person"; readonly id: string; readonly name: string; readonly roles: readonly Role[]; readonly sessionId: string | null }
  | { readonly kind: "customer"; readonly id: string; readonly name: string; readonly linkId: string; readonly purpose: string; readonly subjectId: string }
  | { readonly kind: "device"; readonly id: string; readonly name: string; readonly acts: readonly Act[] }
  | { readonly kind: "system"; readonly id: string; readonly name: string };

/** May this actor do this? Pure; asked by every command and query. */
export function can(actor: Actor, act: Act): boolean {
  switch (actor.kind) {
    case "person": return actor.roles.some((r) => (MATRIX[act] as readonly Role[]).includes(r));
    case "customer": return (act === "customer.approve" && actor.purpose === "estimate") || act === "customer.pay";
    case "device": return actor.acts.includes(act);
    case "system": return true;
  }
}

export const rolesFor = (act: Act): readonly Role[] => MATRIX[act];
