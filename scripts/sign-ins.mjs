import fs from "node:fs";

/** The demo's sign-ins as aligned lines, from the file that the seed wrote. Empty when there is no demo. */
export function signInLines(file) {
  if (!fs.existsSync(file)) return [];
  const rows = JSON.parse(fs.readFileSync(file, "utf8"));
  if (!Array.isArray(rows) || rows.length === 0) return [];
  const columns = [...new Set(rows.flatMap((row) => Object.keys(row)))];
  const text = (value) => (value === undefined || value === null ? "" : String(value));
  const width = Object.fromEntries(columns.map((c) => [c, Math.max(c.length, ...rows.map((row) => text(row[c]).length))]));
  const line = (cells) => columns.map((c, i) => cells[i].padEnd(width[c])).join("  ").trimEnd();
  return ["", "Demo sign-ins", line(columns), ...rows.map((row) => line(columns.map((c) => text(row[c]))))];
}
