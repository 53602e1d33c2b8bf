import { createHash } from "node:crypto";
import { mkdtemp, readdir, rm, stat, utimes, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { folderFiles, sweepIncoming } from "./folder";
import { FileTaken, newFileKey } from "./port";

let root: string;
beforeEach(async () => {
  root = await mkdtemp(path.join(tmpdir(), "files-"));
});
afterEach(async () => {
  await rm(root, { recursive: true });
});

const key = () => newFileKey("0b3c8f0e-7c55-4b7e-9a38-0b8b4c1d2e3f", "photo", "jpg");

describe("files in a folder", () => {
  it("gives back what was put, with its size and hash", async () => {
    const files = folderFiles(path.join(root, "deep/er"));
    const k = key();
    const stored = await files.put(k, Buffer.from("head"), "image/jpeg");
    expect(stored).toEqual({ key: k, size: 4, sha256: createHash("sha256").update("head").digest("hex") });
    expect((await files.get(k))?.toString()).toBe("head");
    expect(await files.exists(k)).toBe(true);
    expect((await stat(path.join(root, "deep/er", k))).mode & 0o077).toBe(0);
  });
  it("never overwrites, even when two come at once, and leaves no half file", async () => {
    const files = folderFiles(root);
    const k = key();
    const results = await Promise.allSettled(Array.from({ length: 8 }, (_, i) => files.put(k, Buffer.from(`v${i}`), "text/plain")));
    expect(results.filter((r) => r.status === "fulfilled")).toHaveLength(1);
    for (const r of results) if (r.status === "rejected") expect(r.reason).toBeInstanceOf(FileTaken);
    const winner = results.findIndex((r) => r.status === "fulfilled");
    expect((await files.get(k))?.toString()).toBe(`v${winner}`);
    expect(await readdir(path.join(root, ".incoming"))).toEqual([]);
  });
  it("says null, false and nothing for what is not there", async () => {
    const files = folderFiles(root);
    expect(await files.get(key())).toBeNull();
    expect(await files.exists(key())).toBe(false);
    await expect(files.delete(key())).resolves.toBeUndefined();
  });
  it("deletes", async () => {
    const files = folderFiles(root);
    const k = key();
    await files.put(k, Buffer.from("x"), "text/plain");
    await files.delete(k);
    expect(await files.get(k)).toBeNull();
  });
  it.each(["../secrets.json", "/etc/passwd", "a/../../b.jpg", "a//b.jpg", "A/b.jpg", "a/b\0.jpg", "", "a/b/c/d/e.jpg", ".incoming/x"])(
    "refuses the key %j in every door",
    async (bad) => {
      const files = folderFiles(root);
      await expect(files.put(bad, Buffer.from("x"), "text/plain")).rejects.toThrow(RangeError);
      await expect(files.get(bad)).rejects.toThrow(RangeError);
      await expect(files.exists(bad)).rejects.toThrow(RangeError);
      await expect(files.delete(bad)).rejects.toThrow(RangeError);
    },
  );
  it("sweeps only old leftovers", async () => {
    expect(await sweepIncoming(root, new Date())).toBe(0);
    await folderFiles(root).put(key(), Buffer.from("x"), "text/plain");
    const now = new Date("2026-03-13T12:00:00Z");
    const old = path.join(root, ".incoming", "old");
    const fresh = path.join(root, ".incoming", "fresh");
    await writeFile(old, "half");
    await writeFile(fresh, "half");
    await utimes(old, now, new Date(now.getTime() - 3_600_001));
    await utimes(fresh, now, new Date(now.getTime() - 60_000));
    expect(await sweepIncoming(root, now)).toBe(1);
    expect(await readdir(path.join(root, ".incoming"))).toEqual(["fresh"]);
  });
  it("makes keys that differ and hold nothing typed", () => {
    expect(key()).not.toBe(key());
    expect(() => newFileKey("../x", "photo", "jpg")).toThrow(RangeError);
    expect(() => newFileKey("shop", "photo", "j/pg")).toThrow(RangeError);
  });
});
