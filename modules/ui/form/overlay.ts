const isRecord = (v: unknown): v is Record<string, unknown> => typeof v === "object" && v !== null && !Array.isArray(v);

/**
 * `kept`, except where `now` has been changed from `before`: what is being typed wins over what was kept earlier.
 * Lists of the same length are gone through one by one; otherwise a changed list wins as a whole.
 */
export function overlay(kept: unknown, before: unknown, now: unknown): unknown {
  if (isRecord(now) && isRecord(kept)) {
    const old = isRecord(before) ? before : {};
    return Object.fromEntries([...new Set([...Object.keys(kept), ...Object.keys(now)])].map((key) => [key, key in now ? (key in kept ? overlay(kept[key], old[key], now[key]) : now[key]) : kept[key]]));
  }
  if (Array.isArray(now) && Array.isArray(kept) && Array.isArray(before) && now.length === before.length && now.length <= kept.length) {
    return kept.map((item: unknown, i) => (i < now.length ? overlay(item, before[i], now[i]) : item));
  }
  return JSON.stringify(now) === JSON.stringify(before) ? kept : now;
}
