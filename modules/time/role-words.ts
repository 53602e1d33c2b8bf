import type { Role } from "@/modules/access/roles";

/** Roles as the shop says them, in the order of the form. */
export const ROLE_WORDS: readonly (readonly [Role, string])[] = [
  ["technician", "Technician"], ["lead", "Lead"], ["inspector", "Inspection"], ["receiving", "Receiving and shipping"], ["counter", "Counter"], ["bookkeeper", "Bookkeeper"], ["manager", "Manager"], ["owner", "Owner"],
  ["accountant", "Accountant (reads the books)"],
];
const roleWord = (role: string): string => ROLE_WORDS.find(([r]) => r === role)?.[1] ?? role;

/** All roles of a person in words, the first one first. */
export const roleWords = (roles: readonly string[]): string => roles.map(roleWord).join(", ");

/** The same by the first word of each, where room is small. */
export const shortRoleWords = (roles: readonly string[]): string => roles.map((r) => roleWord(r).split(" ")[0]).join(", ");
