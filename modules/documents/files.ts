import "server-only";
import { randomUUID } from "node:crypto";
import { and, asc, eq, inArray } from "drizzle-orm";
import { files } from "@/db/schema";
import { sha256 } from "@/modules/access/audit";
import { inShop, NotFound, personIdOf, type ShopContext, type TxContext } from "@/modules/access/context";
import { newFileKey } from "@/modules/outbound/files/port";
import { filePort } from "./ports";

export interface NewFile {
  /** `photo`, `estimate`, `purchase-order`, `invoice`, `tag`, `flow-report` … */
  readonly kind: string;
  readonly name: string;
  readonly mime: string;
  readonly extension: string;
  readonly bytes: Uint8Array;
  readonly thumb?: Uint8Array | undefined;
  readonly subject: { readonly kind: string; readonly id: string };
  readonly note?: string | undefined;
}

/** Bytes that are safe in the store but have no row yet. */
export interface KeptBytes extends Omit<NewFile, "bytes" | "thumb"> {
  readonly storageKey: string;
  readonly thumbKey: string | null;
  readonly sizeBytes: number;
  readonly sha256: string;
}

/** First the bytes, outside any transaction. What gets no row is swept later. */
export async function keepBytes(shopId: string, file: NewFile): Promise<KeptBytes> {
  const { bytes, thumb, ...rest } = file;
  const storageKey = newFileKey(shopId, file.kind, file.extension);
  const stored = await filePort().put(storageKey, bytes, file.mime);
  let thumbKey: string | null = null;
  if (thumb) {
    thumbKey = newFileKey(shopId, `${file.kind}-thumb`, "webp");
    await filePort().put(thumbKey, thumb, "image/webp");
  }
  return { ...rest, storageKey, thumbKey, sizeBytes: bytes.byteLength, sha256: stored.sha256 };
}

/** Then the row, in the transaction of the fact it belongs to. Returns the file's id. */
export async function addFileRow(ctx: TxContext, kept: KeptBytes): Promise<string> {
  const id = randomUUID();
  await ctx.tx.insert(files).values({
    shopId: ctx.shop.id, id, kind: kept.kind, storageKey: kept.storageKey, thumbKey: kept.thumbKey, name: kept.name.slice(0, 200), mime: kept.mime,
    sizeBytes: kept.sizeBytes, sha256: kept.sha256, subjectKind: kept.subject.kind, subjectId: kept.subject.id, note: kept.note ?? "",
    uploadedBy: personIdOf(ctx), at: ctx.now,
  });
  return id;
}

export interface FileView { id: string; name: string; mime: string; note: string; at: string; hasThumb: boolean }

/** Files of one subject (or several), oldest first. */
export async function filesOf(ctx: ShopContext, kind: string, subjectIds: readonly string[]): Promise<(FileView & { subjectId: string })[]> {
  if (subjectIds.length === 0) return [];
  const rows = await inShop(ctx, (tx) => tx.select().from(files)
    .where(and(eq(files.shopId, ctx.shop.id), eq(files.kind, kind), inArray(files.subjectId, [...subjectIds]))).orderBy(asc(files.at)));
  return rows.map((r) => ({ id: r.id, name: r.name, mime: r.mime, note: r.note, at: r.at.toISOString(), hasThumb: r.thumbKey !== null, subjectId: r.subjectId }));
}

/** The bytes of a file of this shop. @throws NotFound also when the bytes are not what was stored. */
export async function readFile(ctx: ShopContext, id: string, thumb = false): Promise<{ name: string; mime: string; bytes: Buffer; subjectKind: string; subjectId: string; kind: string }> {
  const [row] = await inShop(ctx, (tx) => tx.select().from(files).where(and(eq(files.shopId, ctx.shop.id), eq(files.id, id))));
  if (!row) throw new NotFound("file");
  const small = thumb && row.thumbKey;
  const bytes = await filePort().get(small ? row.thumbKey ?? "" : row.storageKey);
  if (!bytes) throw new NotFound("file bytes");
  if (!small && sha256(bytes) !== row.sha256) throw new Error(`file ${id} is not what was stored`);
  return { name: row.name, mime: small ? "image/webp" : row.mime, bytes, subjectKind: row.subjectKind, subjectId: row.subjectId, kind: row.kind };
}

/** A response that shows a file and can do nothing else. */
export function fileResponse(file: { name: string; mime: string; bytes: Uint8Array }, options: { download?: boolean } = {}): Response {
  const ascii = file.name.replace(/[^\w.-]+/g, "_");
  const disposition = options.download ? "attachment" : "inline";
  return new Response(new Uint8Array(file.bytes), {
    headers: {
      "content-type": file.mime,
      "content-disposition": `${disposition}; filename="${ascii}"; filename*=UTF-8''${encodeURIComponent(file.name)}`,
      "content-security-policy": "default-src 'none'; sandbox",
      "cross-origin-resource-policy": "same-origin",
      "cache-control": "private, no-store",
    },
  });
}
