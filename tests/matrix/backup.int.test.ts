import { appendFileSync, existsSync, mkdtempSync, readFileSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { beforeAll, describe, expect, it } from "vitest";
import { filePort } from "@/modules/documents/ports";
import { openStock } from "@/modules/stock/commands/adjust";
import { addPart } from "@/modules/stock/commands/parts";
import { checkBackup } from "@/scripts/backup/check";
import { makeBackup, type Manifest } from "@/scripts/backup/make";
import { behindTheCurtain, currentDatabase } from "@/tests/support/database";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { openTestCluster, superuserUrl } from "@/tests/support/test-cluster";

let a: TestShop;
let programs: string;
const root = mkdtempSync(path.join(tmpdir(), "backup-"));
const cluster = await openTestCluster();
const superuser = (database: string) => superuserUrl(cluster, database);
const NOW = new Date("2026-03-20T17:00:00Z");
const KEY = "first/photo/one.jpg";

beforeAll(async () => {
  a = await testShop("first");
  programs = cluster.bin;
  const part = must(await addPart(a.as("owner"), { sku: "P-1", description: "Valve", partClass: "valve", salePrice: "9.00" }));
  must(await openStock(a.as("owner"), { partId: part.id, qty: "3", value: "27.00" }));
  const stored = await filePort().put(KEY, Buffer.from("bytes of a photo"), "image/jpeg");
  await behindTheCurtain(`insert into files (shop_id, id, kind, storage_key, name, mime, size_bytes, sha256, subject_kind, subject_id, at) values ('${a.shop.id}', gen_random_uuid(), 'photo', '${KEY}', 'one.jpg', 'image/jpeg', ${stored.size}, '${stored.sha256}', 'piece', gen_random_uuid(), now())`);
});

const backup = (name: string, backupUrl = currentDatabase().backupUrl) => makeBackup({ backupUrl, programs, files: filePort(), folder: path.join(root, name), now: NOW });
const check = (name: string) => checkBackup({ folder: path.join(root, name), superuser, programs, scratch: `vk_restore_${process.pid}` });

describe("a backup", () => {
  it("is whole, is restored beside the others, and compares equal", async () => {
    const made = await backup("whole");
    expect(made.rows).toMatchObject({ shops: 1, parts: 1, stock_movements: 1, files: 1 });
    expect(readFileSync(path.join(root, "whole/files", KEY), "utf8")).toBe("bytes of a photo");
    expect((await check("whole")).faults).toEqual([]);
    expect(await behindTheCurtain("select count(*) from pg_database where datname like 'vk_restore_%'")).toEqual(["0"]);
  });
  it("is refused for a role that row security binds, and leaves nothing half done", async () => {
    await expect(backup("partial", currentDatabase().appUrl)).rejects.toThrow(/bound by row security/);
    await expect(backup("owner", currentDatabase().ownerUrl)).rejects.toThrow(/bound by row security/);
    expect(existsSync(path.join(root, "partial"))).toBe(false);
    expect(existsSync(path.join(root, "partial.half"))).toBe(false);
  });
  it("never writes over another", async () => {
    await backup("once");
    await expect(backup("once")).rejects.toThrow(/there already/);
  });
  it("stops when the bytes of a file are gone", async () => {
    await behindTheCurtain(`insert into files (shop_id, id, kind, storage_key, name, mime, size_bytes, sha256, subject_kind, subject_id, at) values ('${a.shop.id}', gen_random_uuid(), 'photo', 'first/photo/gone.jpg', 'gone.jpg', 'image/jpeg', 5, '${"a".repeat(64)}', 'piece', gen_random_uuid(), now())`);
    await expect(backup("gone")).rejects.toThrow(/gone\.jpg are gone/);
    await behindTheCurtain("delete from files where storage_key = 'first/photo/gone.jpg'");
  });
});

describe("checking a backup", () => {
  const altered = async (name: string, change: (folder: string, manifest: Manifest) => void) => {
    const made = await backup(name);
    change(path.join(root, name), made);
    return (await check(name)).faults.join("\n");
  };
  const rewrite = (folder: string, manifest: object) => writeFileSync(path.join(folder, "manifest.json"), JSON.stringify(manifest));
  it("sees a changed byte of the dump and of a file", async () => {
    expect(await altered("byte", (folder) => appendFileSync(path.join(folder, "database.dump"), "x"))).toMatch(/database\.dump is not as it was written/);
    expect(await altered("photo", (folder) => writeFileSync(path.join(folder, "files", KEY), "other bytes"))).toMatch(/one\.jpg is not as it was written/);
  });
  it("sees rows that are missing, and ledgers that differ in words only", async () => {
    expect(await altered("rows", (folder, m) => rewrite(folder, { ...m, rows: { ...m.rows, parts: 2 } }))).toMatch(/parts: 2 rows in the backup, 1 restored/);
    expect(await altered("digest", (folder, m) => rewrite(folder, { ...m, digests: { ...m.digests, journal_lines: "0" } }))).toMatch(/journal_lines: the rows are not the same/);
  });
});
