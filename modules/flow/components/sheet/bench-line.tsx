"use client";
import { Button } from "@/modules/ui/button";
import { HeldField, RangeKeys, type ToolSheet } from "./reading-tools";
import type { SheetColumn } from "./sheet-figures";
import type { Pos } from "./use-sheet";

/** Over the keypad, always in reach: range, pressure held, and one more reading of the same lift. */
export function BenchLine({ sheet, pos, col, onAgain }: { sheet: ToolSheet; pos: Pos; col: SheetColumn; onAgain: () => void }) {
  return (
    <div className="b-line" role="group" aria-label="How it is read">
      <RangeKeys sheet={sheet} pos={pos} col={col} />
      <HeldField sheet={sheet} pos={pos} col={col} width={116} />
      <Button size="sm" variant="lo" onClick={onAgain}>Read again</Button>
    </div>
  );
}
