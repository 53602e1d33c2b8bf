import "server-only";
import { hash, verify } from "@node-rs/argon2";

// OWASP password storage: argon2id, 19 MiB, two passes, one lane.
const COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };
let running = 0;
const waiting: (() => void)[] = [];

/** At most four hashes at a time, so that a flood of sign-ins cannot stall the process. */
async function inTurn<T>(fn: () => Promise<T>): Promise<T> {
  if (running >= 4) await new Promise<void>((go) => waiting.push(go));
  running++;
  try { return await fn(); } finally { running--; waiting.shift()?.(); }
}

export const hashSecret = (text: string): Promise<string> => inTurn(() => hash(text.normalize("NFKC"), COST));

/** False for a wrong secret and for a hash that cannot be read. */
export const verifySecret = (stored: string, text: string): Promise<boolean> =>
  inTurn(() => verify(stored, text.normalize("NFKC")).catch(() => false));
