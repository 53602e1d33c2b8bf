import type { Role } from "@/modules/access/roles";

/** Roles as the shop says them, in the order of the form. */
export const ROLE_WORDS: readonly (readonly [Role, string])[] = [
  ["technician", "Technician"], ["lead", "Lead"], ["inspector", "Inspection"], ["receiving", "Receiving, shipping"], ["counter", "Counter"], ["bookkeeper", "Bookkeeper"], ["manager", "Manager"], ["owner", "Owner"],
  ["accountant", "Accountant, reads the books"],
];
export const roleWord = (role: string): string => ROLE_WORDS.find(([r]) => r === role)?.[1] ?? role;
