import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { commandLog, files } from "@/db/schema";
import { sha256 } from "@/modules/access/audit";
import { allowed } from "@/modules/access/rate-limit";
import { inShop, type ShopContext } from "@/modules/access/context";
import { keepBytes } from "@/modules/documents/files";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { PHOTO_BYTES_MAX, reencodePhoto } from "@/modules/outbound/images/photo";
import { addSheetPhoto, FLOW_FILE, FLOW_PHOTO, readInFile } from "./commands/upload";
import { decodeText } from "./domain/file-text";
import { FILE_BYTES_MAX } from "./file-table";
import { uploadInput } from "./upload-input";

type ReadFile = Extract<Awaited<ReturnType<typeof readInFile>>, { ok: true }>["value"];

/** The answer this request got before for these very bytes. Their place in the store is new with each try, so the log cannot tell by itself. */
async function answeredBefore(ctx: ShopContext, requestId: string, bytes: Uint8Array): Promise<ReadFile | null> {
  const [row] = await inShop(ctx, (tx) => tx.select({ reply: commandLog.reply }).from(commandLog)
    .innerJoin(files, and(eq(files.shopId, commandLog.shopId), eq(sql`${files.id}::text`, sql`${commandLog.reply} ->> 'fileId'`)))
    .where(and(eq(commandLog.shopId, ctx.shop.id), eq(commandLog.requestId, requestId), eq(commandLog.command, readInFile.spec.name), eq(commandLog.actor, `${ctx.actor.kind}:${ctx.actor.id}`), eq(files.sha256, sha256(bytes)))));
  return row ? (row.reply as ReadFile) : null;
}

/** A file of readings: capped, kept as it came, then read into tests. `ask` is the mapping and conditions as JSON. */
export async function uploadReadings(ctx: ShopContext, file: File, ask: string, requestId: string): Promise<Result<ReadFile>> {
  if (file.size === 0) return refuse("FILE_EMPTY", "This file is empty. Choose another.", { field: "file" });
  if (file.size > FILE_BYTES_MAX) return refuse("FILE_TOO_LARGE", "The file is larger than 1 MB. Send the readings of one session.", { field: "file" });
  let raw: unknown;
  try { raw = JSON.parse(ask); } catch { return refuse("INVALID_INPUT", "The mapping is not JSON."); }
  const parsed = uploadInput.safeParse(raw);
  if (!parsed.success) return { ok: false, refusal: { code: "INVALID_INPUT", message: "Some fields need another look.", fields: parsed.error.issues.map((i) => ({ path: i.path.join("."), message: i.message })) } };
  const bytes = new Uint8Array(await file.arrayBuffer());
  const answered = await answeredBefore(ctx, requestId, bytes);
  if (answered) return ok(answered);
  const { text } = decodeText(bytes);
  // Control characters inside mean a picture, a workbook or an archive under a wrong name.
  if (/[\u0000-\u0008\u000e-\u001f]/.test(text)) return refuse("FILE_NOT_TEXT", "This is not a text file. Save the sheet as CSV and send that.", { field: "file" });
  const kept = await keepBytes(ctx.shop.id, { kind: FLOW_FILE, name: file.name, mime: "text/csv", extension: "csv", bytes, subject: { kind: "head", id: parsed.data.headId } });
  const name = file.name.replace(/\p{Cc}/gu, "").slice(0, 200) || "readings.csv";
  return readInFile(ctx, { ...parsed.data, text, file: { name, mime: "text/csv", storageKey: kept.storageKey, sizeBytes: kept.sizeBytes, sha256: kept.sha256 } }, { requestId });
}

/** A photograph of the paper sheet: capped, drawn anew, kept, then written to its head. */
export async function uploadSheetPhoto(ctx: ShopContext, headId: string, file: File): Promise<Result<{ id: string; count: number }>> {
  if (!(await allowed(`photo:${ctx.shop.id}:${ctx.actor.id}`, 120, 60))) return refuse("TOO_MANY", "That is a lot of photographs at once. Wait a minute and send the rest.");
  if (file.size > PHOTO_BYTES_MAX) return refuse("photo_too_large", "The photograph is larger than 25 MB. Send a smaller one.");
  const photo = await reencodePhoto(new Uint8Array(await file.arrayBuffer()));
  if (!photo.ok) return photo;
  const { full, thumbnail } = photo.value;
  const kept = await keepBytes(ctx.shop.id, { kind: FLOW_PHOTO, name: file.name || "sheet.jpg", mime: full.mime, extension: "jpg", bytes: full.bytes, thumb: thumbnail.bytes, subject: { kind: "head", id: headId } });
  return addSheetPhoto(ctx, { headId, name: kept.name.slice(0, 200), storageKey: kept.storageKey, thumbKey: kept.thumbKey, sizeBytes: kept.sizeBytes, sha256: kept.sha256 });
}
