import "server-only";
import { randomBytes } from "node:crypto";
import { hashToken } from "@/modules/access/secret-token";
import { codeFrom } from "../domain/enrol-letters";

/** How long a code works. */
export const ENROL_MINUTES = 10;

export const newEnrolCode = (): string => codeFrom(randomBytes(64));

/** What is kept of a code. Typed in any case, with or without its dash. */
export const enrolCodeHash = (typed: string): string => hashToken(`enrol:${typed.toUpperCase().replace(/[^0-9A-Z]/g, "")}`);
