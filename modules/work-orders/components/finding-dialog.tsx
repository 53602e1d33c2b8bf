"use client";

import { usePathname, useRouter, useSearchParams } from "next/navigation";
import { proposedFinding, type ProposedFinding } from "@/modules/flow/domain/proposed-finding";
import { Button } from "@/modules/ui/button";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { SelectInput } from "@/modules/ui/form/select-input";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { usePlace } from "@/modules/ui/place";
import { recordFindingAction } from "../actions";
import { findingInput } from "../input";
import { CommandDialog } from "./command-dialog";
import type { PieceName } from "./order-dialogs";

/** What the dialog begins with: the proposal where there is one. */
export const findingValues = (pieces: readonly PieceName[], proposed: ProposedFinding | null) => ({
  pieceId: proposed?.pieceId ?? pieces[0]?.id ?? "", words: proposed?.words ?? "", position: proposed?.position ?? "", goOnMeanwhile: true,
});
/** Name of the copy kept in this tab: one for each proposal, so that what was changed in one never stands in another. */
export const findingDraft = (pieces: readonly PieceName[], proposed: ProposedFinding | null): string => `finding-${pieces[0]?.id ?? ""}-${proposed ? `${proposed.pieceId}-${proposed.words}` : ""}`;

/** Opens by its key, or by itself when another page proposed what to write. A proposal is only a beginning: what is changed in it stays. */
export function FindingDialog({ pieces, onRecorded }: { pieces: readonly PieceName[]; onRecorded?: (id: string) => void }) {
  const { slug } = usePlace();
  const router = useRouter();
  const path = usePathname();
  const proposed = proposedFinding(useSearchParams(), pieces.map((p) => p.id));
  return (
    <CommandDialog
      key={proposed?.words ?? ""} startsOpen={proposed !== null} draft={findingDraft(pieces, proposed)}
      trigger={<Button size="sm" icon="flag">Record finding</Button>} title="What was found?" description={proposed ? "Proposed from the measurement sheet; change it as you like. Nothing of it is started before the customer says yes." : "Nothing of it is started before the customer says yes."}
      submit="Record it" pendingText="Recording…" schema={findingInput} values={findingValues(pieces, proposed)} action={(s) => recordFindingAction(slug, s)} done={() => "Finding recorded. Add its photo beside it"}
      onDone={(v) => {
        // The proposal is used up: a look at the page again does not propose it twice.
        if (proposed) router.replace(path, { scroll: false });
        onRecorded?.(v.id);
      }}
    >
      {pieces.length > 1 ? <SelectInput name="pieceId" label="Head" options={pieces.map((p) => ({ value: p.id, label: p.label }))} /> : null}
      <TextInput className="mt-3" name="position" label="Where" optional hint="Such as: exhaust, 1 and 2." />
      <TextareaInput className="mt-3" name="words" label="In words for the customer" rows={3} />
      <Checkbox className="mt-3" name="goOnMeanwhile" label="The agreed work goes on meanwhile" hint="Otherwise the head is held for the answer." />
    </CommandDialog>
  );
}
