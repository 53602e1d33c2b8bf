"use client";

import { useRouter } from "next/navigation";
import { Bay, Bays } from "@/modules/ui/bay";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { CommandForm } from "@/modules/ui/form/command-form";
import { NumberInput } from "@/modules/ui/form/number-input";
import { RadioRow } from "@/modules/ui/form/radio-row";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { receivePieceAction } from "../actions";
import { PHOTOS_WANTED } from "../domain/photos-wanted";
import { TRAY_KINDS } from "../domain/tray-kinds";
import { receiveInput } from "../input";
import type { PiecePage } from "../queries/piece";
import { PhotoStrip } from "./photo-strip";

const CONDITIONS = [["sound", "Sound"], ["handed over", "Handed over"], ["crushed", "Crushed"], ["wet", "Wet"], ["open", "Open"]] as const;

/** Books a piece in at the back door: photos, parcel, what lies in the tray, what is missing. Then the tag. */
export function ReceiveForm({ piece }: { piece: PiecePage }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: receiveInput, draft: `receive-${piece.id}`,
    defaultValues: { pieceId: piece.id, version: piece.version, parcelCondition: "sound", counts: Object.fromEntries(TRAY_KINDS.map((k) => [k, ""])), castingNumber: piece.castingNumber, serial: piece.serial, missing: "", damage: "", notes: "", place: "", fewPhotosOk: false },
    action: (sent) => {
      // Kinds that were left empty did not come.
      const counts = Object.fromEntries(Object.entries(sent.input.counts ?? {}).filter(([, n]) => String(n).trim() !== ""));
      return receivePieceAction(slug, { ...sent, input: { ...sent.input, version: piece.version, counts } });
    },
    onDone: (v) => {
      toast({ text: `Booked in under ${v.tag}${v.mailed ? ", and the customer told" : ""}` });
      router.push(`/s/${slug}/orders/${v.number}/pieces/${v.pieceNo}`);
      router.refresh();
    },
  });
  const few = piece.photos.length < PHOTOS_WANTED;
  return (
    <CommandForm form={form} toFix="before the tag is given" label="Book in">
      <Bays className="mt-2">
        <Bay label={`Photos, ${piece.photos.length}`}>
          <PhotoStrip subject={{ kind: "piece", id: piece.id }} photoIds={piece.photos.map((p) => p.id)} label="Photo of the head" mayAdd wanted={PHOTOS_WANTED} />
          {few ? <Checkbox className="mt-2" name="fewPhotosOk" label={`Fewer than ${PHOTOS_WANTED} photos, it is so`} /> : null}
        </Bay>
        <Bay label="Parcel">
          <RadioRow name="parcelCondition" label="How it came" options={CONDITIONS.map(([value, label]) => ({ value, label }))} />
          <div className="mt-3"><Note tone="warn">Fuel and oil: drain what is left, outdoors or under extraction, and wear gloves. Refuse parcels that leak fuel (49 CFR parts 171 to 180 for the carrier; local rules for you).</Note></div>
        </Bay>
        <Bay label="In the tray">
          <div className="grid gap-x-4 gap-y-4" style={{ gridTemplateColumns: "repeat(auto-fill, minmax(104px, 1fr))" }}>
            {TRAY_KINDS.map((k) => <NumberInput key={k} name={`counts.${k}`} label={k[0]?.toUpperCase() + k.slice(1)} />)}
          </div>
          <p className="hint">Count each kind; leave empty what did not come. Keep them by position with the tag.</p>
        </Bay>
        <Bay label="Head">
          <div className="fields">
            <TextInput name="castingNumber" label="Casting number" optional hint={piece.castingNumber ? `Announced as ${piece.castingNumber}` : "As stamped"} />
            <TextInput name="serial" label="Serial" optional hint={piece.serial ? `Announced as ${piece.serial}` : "As stamped"} />
            <TextareaInput name="damage" label="Damage seen" optional rows={2} hint="The customer is told." />
            <TextareaInput name="missing" label="Missing" optional rows={2} hint="The customer is told." />
            <TextInput name="place" label="Where it lies" optional hint="Rack, shelf or bench. Left out: the counter." />
            <TextInput name="notes" label="Note for the bench" optional />
          </div>
        </Bay>
      </Bays>
      <div className="form-act">
        <SubmitButton size="xl" pendingText="Booking in…">Book in</SubmitButton>
      </div>
    </CommandForm>
  );
}
