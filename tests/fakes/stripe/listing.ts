import { invalid } from "./refusal";

interface Listed {
  id: string;
  created: number;
}

/** A list as the provider pages it: newest first, `limit`, `starting_after`, `ending_before`, `created[gte]` and so on. */
export function pageOf<T extends Listed>(all: readonly T[], query: URLSearchParams, url: string) {
  const limitText = query.get("limit");
  const limit = limitText === null ? 10 : Number(limitText);
  if (!Number.isInteger(limit) || limit < 1 || limit > 100) throw invalid("Invalid limit: must be between 1 and 100", "limit");
  const bounds = (["gt", "gte", "lt", "lte"] as const).map((op) => [op, query.get(`created[${op}]`)] as const);
  const fits = (o: Listed) =>
    bounds.every(([op, text]) => {
      if (text === null) return true;
      const t = Number(text);
      return op === "gt" ? o.created > t : op === "gte" ? o.created >= t : op === "lt" ? o.created < t : o.created <= t;
    });
  const newestFirst = all.map((o, i) => ({ o, i })).sort((a, b) => b.o.created - a.o.created || b.i - a.i).map(({ o }) => o).filter(fits);
  const place = (id: string): number => {
    const at = newestFirst.findIndex((o) => o.id === id);
    if (at < 0) throw invalid(`No such object: '${id}'`, "starting_after", "resource_missing");
    return at;
  };
  const after = query.get("starting_after");
  const before = query.get("ending_before");
  const from = after === null ? 0 : place(after) + 1;
  const rest = before === null ? newestFirst.slice(from) : newestFirst.slice(0, place(before));
  const data = before === null ? rest.slice(0, limit) : rest.slice(-limit);
  return { object: "list" as const, url, has_more: rest.length > data.length, data };
}

/** Replace ids by the objects themselves along the paths of `expand`, such as `data.source`. */
export function expanded<T extends object>(object: T, paths: readonly string[], find: (id: string) => object | undefined): T {
  if (paths.length === 0) return object;
  const copy = structuredClone(object);
  const walk = (node: unknown, path: readonly string[]): void => {
    const [name, ...rest] = path;
    if (name === undefined || typeof node !== "object" || node === null) return;
    if (Array.isArray(node)) {
      for (const child of node) walk(child, path);
      return;
    }
    const record = node as Record<string, unknown>;
    const value = record[name];
    if (typeof value === "string") {
      const found = find(value);
      if (found === undefined) throw invalid(`This property cannot be expanded (${name}).`, "expand");
      record[name] = structuredClone(found);
    }
    walk(record[name], rest);
  };
  for (const path of paths) walk(copy, path.split("."));
  return copy;
}
