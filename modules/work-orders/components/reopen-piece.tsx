"use client";
import { Button } from "@/modules/ui/button";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { usePlace } from "@/modules/ui/place";
import { reopenPieceAction } from "../actions";
import { reopenPieceInput } from "../input";
import { CommandDialog } from "./command-dialog";

/** A lead opens a released head again, with a reason. */
export function ReopenPiece({ pieceId, version, tag }: { pieceId: string; version: number; tag: string }) {
  const { slug } = usePlace();
  return (
    <CommandDialog
      trigger={<Button>Open again</Button>} title={`Open ${tag} again?`} submit="Open again" schema={reopenPieceInput} values={{ pieceId, version, reason: "" }}
      action={(s) => reopenPieceAction(slug, s)} done={() => `${tag} is open again`}
    >
      <TextareaInput name="reason" label="Why" rows={2} />
    </CommandDialog>
  );
}
