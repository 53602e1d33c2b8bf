import "server-only";
import { randomInt } from "node:crypto";
import { hashToken } from "@/modules/access/secret-token";

/** No letter or digit that is misread for another. */
const LETTERS = "23456789ABCDEFGHJKMNPQRSTVWXYZ";
export const ENROL_MINUTES = 10;

/** Eight letters in two groups, about 39 bits: enough for ten minutes under a limit of tries. */
export const newEnrolCode = (): string => {
  const eight = Array.from({ length: 8 }, () => LETTERS[randomInt(LETTERS.length)]).join("");
  return `${eight.slice(0, 4)}-${eight.slice(4)}`;
};

/** What is kept of a code. Typed in any case, with or without its dash. */
export const enrolCodeHash = (typed: string): string => hashToken(`enrol:${typed.toUpperCase().replace(/[^0-9A-Z]/g, "")}`);
