"use client";

import { Button } from "@/modules/ui/button";
import { TextInput } from "@/modules/ui/form/text-input";
import { usePlace } from "@/modules/ui/place";
import { movePieceAction, reopenPieceAction } from "../actions";
import { placeInput, reopenPieceInput } from "../input";
import { CommandDialog } from "./command-dialog";

export function MovePieceDialog({ pieceId, version, place }: { pieceId: string; version: number; place: string }) {
  const { slug } = usePlace();
  return (
    <CommandDialog trigger={<button type="button" className="lk">Lies elsewhere</button>} title="Where does it lie?" submit="Note it" schema={placeInput} values={{ pieceId, version, place }} action={(s) => movePieceAction(slug, s)} done={() => "Place noted"}>
      <TextInput name="place" label="Rack, shelf or bench" optional />
    </CommandDialog>
  );
}

export function ReopenDialog({ pieceId, version, tag }: { pieceId: string; version: number; tag: string }) {
  const { slug } = usePlace();
  return (
    <CommandDialog
      trigger={<Button size="sm">Open it again</Button>} title={`Open ${tag} again?`} description="The release is taken back and final inspection is done anew. Both stay on record." safe="Keep it released" submit="Open it again"
      schema={reopenPieceInput} values={{ pieceId, version, reason: "" }} action={(s) => reopenPieceAction(slug, s)} done={() => `${tag} is open again`}
    >
      <TextInput name="reason" label="Why" />
    </CommandDialog>
  );
}
