import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { files, findings, workPieces } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { addFileRow } from "@/modules/documents/files";
import { ok, refuse } from "@/modules/kernel/result";
import { addPhotoInput } from "../input";

const MOST = 60;

/** The row of a photo whose bytes are safe in the store already. The subject must be of this shop. */
export const addPhoto = defineCommand({
  name: "photos.add",
  act: "files.add",
  input: addPhotoInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const subjects = input.subjectKind === "piece"
      ? await tx.select({ id: workPieces.id }).from(workPieces).where(and(eq(workPieces.shopId, shop.id), eq(workPieces.id, input.subjectId)))
      : await tx.select({ id: findings.id }).from(findings).where(and(eq(findings.shopId, shop.id), eq(findings.id, input.subjectId)));
    if (subjects.length === 0) return refuse("NOT_FOUND", "What this photo belongs to is not here any more.");
    // Keys are made by the store under the shop's own folder; a forged one would point elsewhere.
    if (!input.storageKey.startsWith(`${shop.id}/`) || (input.thumbKey !== null && !input.thumbKey.startsWith(`${shop.id}/`))) return refuse("NOT_FOUND", "These bytes are not here.");
    const [{ n } = { n: 0 }] = await tx.select({ n: sql<number>`count(*)::int` }).from(files).where(and(eq(files.shopId, shop.id), eq(files.kind, "photo"), eq(files.subjectId, input.subjectId)));
    if (n >= MOST) return refuse("TOO_MANY_PHOTOS", `There are ${MOST} photos already; that is the most.`);
    // The same picture sent again, after a lost answer for one, is the picture that is here.
    const [same] = await tx.select({ id: files.id }).from(files).where(and(eq(files.shopId, shop.id), eq(files.kind, "photo"), eq(files.subjectId, input.subjectId), eq(files.sha256, input.sha256))).limit(1);
    if (same) return ok({ id: same.id, count: n });
    const id = await addFileRow(ctx, {
      kind: "photo", name: input.name, mime: "image/jpeg", extension: "jpg", subject: { kind: input.subjectKind, id: input.subjectId }, note: input.note,
      storageKey: input.storageKey, thumbKey: input.thumbKey, sizeBytes: input.sizeBytes, sha256: input.sha256,
    });
    return ok({ id, count: n + 1 });
  },
  subject: (input) => ({ kind: input.subjectKind, id: input.subjectId }),
});
