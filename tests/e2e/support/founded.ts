import { execFile } from "node:child_process";
import path from "node:path";
import { promisify } from "node:util";

export interface Founded {
  readonly slug: string;
  readonly shopId: string;
  /** Ids by short name. */
  readonly people: Readonly<Record<string, string>>;
}

const PROJECT = path.resolve(import.meta.dirname, "../../..");

/** Founds a shop in a process of its own: the product's commands run on the server only. */
async function founded(slug: string, kind: "empty" | "work"): Promise<unknown> {
  const { stdout } = await promisify(execFile)(
    process.execPath, ["--conditions=react-server", "--import", "tsx", path.join(PROJECT, "tests/e2e/support/found-run.ts"), slug, kind], { cwd: PROJECT, env: process.env },
  );
  const line = stdout.split("\n").find((l) => l.startsWith("FOUNDED "));
  if (line === undefined) throw new Error(`nothing was founded: ${stdout}`);
  return JSON.parse(line.slice("FOUNDED ".length)) as unknown;
}

export const foundShopFor = async (slug: string): Promise<Founded> => (await founded(slug, "empty")) as Founded;

/** One with a head in it: its order and tag come along. */
export const foundShopWithWork = async (slug: string): Promise<Founded & { order: string; tag: string }> => (await founded(slug, "work")) as Founded & { order: string; tag: string };
