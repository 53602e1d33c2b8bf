import type { SnapshotLine } from "./estimate-snapshot";

const key = (l: SnapshotLine) => [l.kind, l.pieceNo ?? "", l.code, l.description, l.qtyMilli, l.amountMinor].join("|");

/** Lines that came and lines that went between two versions; one that changed its quantity or price stands on both sides. */
export function lineChanges(before: readonly SnapshotLine[], after: readonly SnapshotLine[]): { more: SnapshotLine[]; less: SnapshotLine[] } {
  const left = [...before];
  const more = after.filter((l) => {
    const at = left.findIndex((b) => key(b) === key(l));
    if (at === -1) return true;
    left.splice(at, 1);
    return false;
  });
  return { more, less: left };
}
