import "server-only";
import { allowed } from "@/modules/access/rate-limit";
import type { ShopContext } from "@/modules/access/context";
import { keepBytes } from "@/modules/documents/files";
import { refuse, type Result } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import { PHOTO_BYTES_MAX, reencodePhoto } from "@/modules/outbound/images/photo";
import { addPhoto } from "./commands/photos";

export const uploadInput = z.strictObject({ subjectKind: z.enum(["piece", "finding"]), subjectId: z.uuid(), name: z.string().trim().max(200).default("photo.jpg"), note: z.string().trim().max(200).default("") });

/** The bytes of a request, read piece by piece; null as soon as there are more than `most`. */
async function bytesUpTo(body: ReadableStream<Uint8Array> | null, most: number): Promise<Uint8Array | null> {
  if (!body) return new Uint8Array();
  const parts: Uint8Array[] = [];
  let size = 0;
  for await (const part of body as unknown as AsyncIterable<Uint8Array>) {
    size += part.byteLength;
    if (size > most) return null;
    parts.push(part);
  }
  return Buffer.concat(parts);
}

/** A photo from a phone: capped, drawn anew, kept, then written to its piece or finding. */
export async function uploadPhoto(ctx: ShopContext, input: z.output<typeof uploadInput>, body: ReadableStream<Uint8Array> | null): Promise<Result<{ id: string; count: number }>> {
  if (!(await allowed(`photo:${ctx.shop.id}:${ctx.actor.id}`, 120, 60))) return refuse("TOO_MANY", "That is a lot of photos at once. Wait a minute and send the rest.");
  const bytes = await bytesUpTo(body, PHOTO_BYTES_MAX);
  if (!bytes) return refuse("photo_too_large", "The photo is larger than 25 MB. Send a smaller one.");
  const photo = await reencodePhoto(bytes);
  if (!photo.ok) return photo;
  const { full, thumbnail } = photo.value;
  const kept = await keepBytes(ctx.shop.id, {
    kind: "photo", name: input.name, mime: full.mime, extension: "jpg", bytes: full.bytes, thumb: thumbnail.bytes, subject: { kind: input.subjectKind, id: input.subjectId }, note: input.note,
  });
  return addPhoto(ctx, { ...input, name: kept.name, storageKey: kept.storageKey, thumbKey: kept.thumbKey, sizeBytes: kept.sizeBytes, sha256: kept.sha256 });
}
