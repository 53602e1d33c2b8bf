import { readFileSync, statSync } from "node:fs";

/**
 * Now, or the instant in the test clock's file running on from when the file was written: the same rule as the
 * application's, so that both agree. An empty or missing file means the real time.
 */
export function clockFrom(file: string | undefined): () => Date {
  return () => {
    if (file === undefined || file === "") return new Date();
    try {
      const text = readFileSync(file, "utf8").trim();
      if (text === "") return new Date();
      const begin = new Date(text).getTime();
      if (Number.isNaN(begin)) throw new Error(`${file} does not hold an instant: ${text}`);
      return new Date(begin + (Date.now() - statSync(file).mtimeMs));
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code === "ENOENT") return new Date();
      throw error;
    }
  };
}
