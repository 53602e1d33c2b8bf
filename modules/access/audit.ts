import "server-only";
import { createHash } from "node:crypto";
import { desc, eq, sql } from "drizzle-orm";
import { auditLog } from "@/db/schema";
import type { TxContext } from "./context";

/** Stable text of a value: keys sorted, so that the same facts give the same hash. */
export function canonical(value: unknown): string {
  if (value === null || typeof value !== "object") return JSON.stringify(value ?? null);
  if (value instanceof Date) return JSON.stringify(value.toISOString());
  if (Array.isArray(value)) return `[${value.map(canonical).join(",")}]`;
  return `{${Object.entries(value).filter(([, v]) => v !== undefined).sort(([a], [b]) => (a < b ? -1 : 1)).map(([k, v]) => `${JSON.stringify(k)}:${canonical(v)}`).join(",")}}`;
}

export const sha256 = (text: string | Uint8Array): string => createHash("sha256").update(text).digest("hex");

export interface AuditEntry {
  command: string;
  requestId: string | null;
  subjectKind?: string | undefined;
  subjectId?: string | undefined;
  note?: string | undefined;
  detail: unknown;
}

export interface ChainedRow extends AuditEntry { seq: number; at: string; actor: string; actorName: string }

/** Hash of a row over the one before it. */
export const chainHash = (prevHash: string, row: ChainedRow): string =>
  sha256(prevHash + canonical({
    seq: row.seq, at: row.at, actor: row.actor, actorName: row.actorName, command: row.command, requestId: row.requestId,
    subjectKind: row.subjectKind ?? null, subjectId: row.subjectId ?? null, note: row.note ?? "", detail: row.detail,
  }));

/** Writes the next row of the shop's chain. Takes the shop's audit lock, so call it as late in the transaction as can be. */
export async function writeAudit(ctx: TxContext, entry: AuditEntry): Promise<void> {
  const { tx, shop, actor } = ctx;
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`audit:${shop.id}`}, 0))`);
  const [last] = await tx.select({ seq: auditLog.seq, hash: auditLog.hash }).from(auditLog)
    .where(eq(auditLog.shopId, shop.id)).orderBy(desc(auditLog.seq)).limit(1);
  const detail = JSON.parse(JSON.stringify(entry.detail ?? null)) as unknown;
  const row = { ...entry, detail, seq: (last?.seq ?? 0) + 1, at: ctx.now.toISOString(), actor: `${actor.kind}:${actor.id}`, actorName: actor.name };
  const prevHash = last?.hash ?? "";
  await tx.insert(auditLog).values({
    shopId: shop.id, seq: row.seq, at: ctx.now, actor: row.actor, actorName: row.actorName, command: row.command, requestId: row.requestId,
    subjectKind: row.subjectKind ?? null, subjectId: row.subjectId ?? null, note: row.note ?? "", detail, prevHash, hash: chainHash(prevHash, row),
  });
}
