import { readFileSync } from "node:fs";
import path from "node:path";

export interface Invariant { readonly id: string; readonly says: string; readonly sql: string }
export interface Breach extends Invariant { readonly rows: Record<string, unknown>[] }
interface Asks { query(text: string): Promise<{ rows: Record<string, unknown>[] }> }

const FILE = path.join(import.meta.dirname, "invariants.sql");

/** The invariants of db/invariants.sql, in their order. @throws when the file holds none */
export function invariants(): Invariant[] {
  const parts = readFileSync(FILE, "utf8").split(/^-- (?=I-\d+ )/m).slice(1);
  const read = parts.map((part) => {
    const [head = "", ...body] = part.split("\n");
    const [, id = "", says = ""] = /^(I-\d+) (.+)$/.exec(head) ?? [];
    return { id, says, sql: body.join("\n").trim() };
  });
  if (read.length === 0) throw new Error("db/invariants.sql holds no invariant");
  return read;
}

/** Asks each invariant, on a connection that sees all shops. Answers those that do not hold, with the rows that break them. */
export async function breaches(client: Asks): Promise<Breach[]> {
  const broken: Breach[] = [];
  for (const one of invariants()) {
    const { rows } = await client.query(one.sql);
    if (rows.length > 0) broken.push({ ...one, rows });
  }
  return broken;
}
