import "server-only";
import { chainHash } from "./audit";

/** A row of the trail as it is kept. */
export interface KeptRow {
  readonly seq: number;
  readonly at: Date;
  readonly actor: string;
  readonly actorName: string;
  readonly command: string;
  readonly requestId: string | null;
  readonly subjectKind: string | null;
  readonly subjectId: string | null;
  readonly note: string;
  readonly detail: unknown;
  readonly prevHash: string;
  readonly hash: string;
}

export interface ChainFault { readonly seq: number; readonly why: "missing" | "changed" | "not joined" }

/**
 * The first row of a shop's trail that is gone, changed, or not joined to the one before; null when the chain is whole.
 * `head` is the last hash known from elsewhere (a backup, yesterday's): without it a cut-off tail cannot show.
 * @param rows in the order of `seq`
 */
export function chainFault(rows: readonly KeptRow[], head?: { readonly seq: number; readonly hash: string }): ChainFault | null {
  let prev = "";
  for (const [i, row] of rows.entries()) {
    if (row.seq !== i + 1) return { seq: i + 1, why: "missing" };
    if (row.prevHash !== prev) return { seq: row.seq, why: "not joined" };
    const { prevHash, hash, at, ...rest } = row;
    if (chainHash(prevHash, { ...rest, at: at.toISOString(), subjectKind: row.subjectKind ?? undefined, subjectId: row.subjectId ?? undefined }) !== hash) return { seq: row.seq, why: "changed" };
    prev = hash;
  }
  if (!head) return null;
  const known = rows[head.seq - 1];
  if (!known) return { seq: rows.length + 1, why: "missing" };
  return known.hash === head.hash ? null : { seq: head.seq, why: "changed" };
}
