import "server-only";
import { createHash, createHmac, randomBytes } from "node:crypto";
import { env } from "./env";

/** 32 random bytes in URL-safe letters; only the hash is kept. */
export const newToken = (): string => randomBytes(32).toString("base64url");
export const hashToken = (token: string): string => createHash("sha256").update(token).digest("hex");

/**
 * The token of a link, made anew from its id whenever it must be printed or mailed again, so that the database holds
 * no token: a keyed hash of the id under the application's secret.
 */
export const linkToken = (linkId: string): string => createHmac("sha256", env().NEXTAUTH_SECRET).update(`link:${linkId}`).digest("base64url");
