import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";

export const ROOT = path.join(import.meta.dirname, "../..");

/** Source files below a folder of the project, as paths from its root. */
export function sources(folder: string, ending = /\.tsx?$/): string[] {
  return readdirSync(path.join(ROOT, folder), { recursive: true, withFileTypes: true })
    .filter((e) => e.isFile() && ending.test(e.name))
    .map((e) => path.relative(ROOT, path.join(e.parentPath, e.name)));
}
export const textOf = (file: string): string => readFileSync(path.join(ROOT, file), "utf8");
