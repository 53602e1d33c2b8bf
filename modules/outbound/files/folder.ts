import { createHash, randomUUID } from "node:crypto";
import { constants } from "node:fs";
import { access, link, mkdir, open, readFile, readdir, rm, stat, unlink } from "node:fs/promises";
import path from "node:path";
import { checkKey, FileTaken, type FilePort } from "./port";

const codeOf = (error: unknown): string => (error as NodeJS.ErrnoException).code ?? "";

async function syncFolder(folder: string): Promise<void> {
  const handle = await open(folder, constants.O_RDONLY);
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}

/** Make a folder and every parent below `root`, each made durable in the one above it. */
async function ensureFolder(root: string, folder: string): Promise<void> {
  const made = await mkdir(folder, { recursive: true, mode: 0o700 });
  if (made === undefined) return;
  for (let at = folder; at.length >= root.length; at = path.dirname(at)) await syncFolder(path.dirname(at));
}

/**
 * Files in a folder. A file appears under its key only when all of it is on the disk: the bytes go to a
 * temporary file, are synced, and get their name by a hard link, which fails rather than replaces.
 */
export function folderFiles(root: string): FilePort {
  const base = path.resolve(/* turbopackIgnore: true */ root);
  const temporary = path.join(base, ".incoming");
  const at = (key: string) => path.join(base, checkKey(key));

  return {
    async put(key, bytes) {
      const target = at(key);
      await ensureFolder(base, temporary);
      await ensureFolder(base, path.dirname(target));
      const half = path.join(temporary, randomUUID());
      const handle = await open(half, "wx", 0o600);
      try {
        try {
          await handle.writeFile(bytes);
          await handle.sync();
        } finally {
          await handle.close();
        }
        await link(half, target);
      } catch (error) {
        throw codeOf(error) === "EEXIST" ? new FileTaken(key) : error;
      } finally {
        await rm(half, { force: true });
      }
      await syncFolder(path.dirname(target));
      return { key, size: bytes.byteLength, sha256: createHash("sha256").update(bytes).digest("hex") };
    },
    async get(key) {
      try {
        return await readFile(at(key));
      } catch (error) {
        if (codeOf(error) === "ENOENT") return null;
        throw error;
      }
    },
    async exists(key) {
      try {
        await access(at(key));
        return true;
      } catch (error) {
        if (codeOf(error) === "ENOENT") return false;
        throw error;
      }
    },
    async delete(key) {
      try {
        await unlink(at(key));
      } catch (error) {
        if (codeOf(error) !== "ENOENT") throw error;
      }
    },
  };
}

/** Remove what interrupted uploads left behind, older than `olderThanMs` at `now`. Returns how many. */
export async function sweepIncoming(root: string, now: Date, olderThanMs = 3_600_000): Promise<number> {
  const folder = path.join(path.resolve(/* turbopackIgnore: true */ root), ".incoming");
  let names: string[];
  try {
    names = await readdir(folder);
  } catch (error) {
    if (codeOf(error) === "ENOENT") return 0;
    throw error;
  }
  let swept = 0;
  for (const name of names) {
    const file = path.join(folder, name);
    try {
      if (now.getTime() - (await stat(file)).mtimeMs < olderThanMs) continue;
      await unlink(file);
      swept += 1;
    } catch (error) {
      if (codeOf(error) !== "ENOENT") throw error;
    }
  }
  return swept;
}
