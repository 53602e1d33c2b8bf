"use client";
import { useRouter } from "next/navigation";
import { Bay, Bays } from "@/modules/ui/bay";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { CommandForm } from "@/modules/ui/form/command-form";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { receivePieceAction } from "../actions";
import { TRAY_KINDS } from "../domain/tray-kinds";
import { receiveInput } from "../input";
import { PhotoStrip } from "./photo-strip";

const PARCEL = [["sound", "Sound"], ["handed over", "Handed over at the counter"], ["crushed", "Crushed"], ["wet", "Wet"], ["open", "Open"]] as const;

export interface ReceiveSheet { pieceId: string; version: number; pieceNo: number; number: string; castingNumber: string; serial: string; photoIds: string[]; photosWanted: number }

/** Booking a head in: photos, what came with it, its marks, what is missing or damaged. Gives it its tag. */
export function ReceiveForm({ sheet }: { sheet: ReceiveSheet }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const few = sheet.photoIds.length < sheet.photosWanted;
  const form = useCommandForm({
    schema: receiveInput, draft: `receive-${sheet.pieceId}`,
    defaultValues: {
      pieceId: sheet.pieceId, version: sheet.version, parcelCondition: "sound", counts: Object.fromEntries(TRAY_KINDS.map((k) => [k, "0"])), castingNumber: sheet.castingNumber, serial: sheet.serial,
      missing: "", damage: "", notes: "", place: "", fewPhotosOk: false,
    },
    action: (sent) => receivePieceAction(slug, sent),
    onDone: (v) => {
      toast({ text: `Booked in under tag ${v.tag}` });
      router.push(`/s/${slug}/orders/${sheet.number}/pieces/${sheet.pieceNo}`);
    },
  });
  return (
    <Bays>
      <Bay label="Photos">
        <PhotoStrip subject={{ kind: "piece", id: sheet.pieceId }} photoIds={sheet.photoIds} label="Photo of the head" mayAdd wanted={sheet.photosWanted} />
      </Bay>
      <Note title="Parcels smell of fuel?">Drain it outdoors, away from flame and grinders, and say so in the notes. Refuse what leaks. Local rules on flammable parcels come first.</Note>
      <CommandForm form={form} label="Booking in" toFix="before the head is booked in">
        <div className="fields">
          <SelectInput name="parcelCondition" label="Parcel" options={PARCEL.map(([value, label]) => ({ value, label }))} />
          <TextInput name="place" label="Where it lies" optional hint="Shelf, rack or bench. Left out: the counter." />
          <TextInput name="castingNumber" label="Casting number" optional />
          <TextInput name="serial" label="Serial or stamps" optional />
        </div>
        <fieldset className="mt-5">
          <legend className="eng ink mb-2">Loose parts counted into the tray</legend>
          <div className="fields three">
            {TRAY_KINDS.map((k) => <NumberInput key={k} name={`counts.${k}`} label={k[0]?.toUpperCase() + k.slice(1)} whole alignEnd />)}
          </div>
        </fieldset>
        <div className="fields mt-5">
          <TextareaInput name="missing" label="Missing" optional rows={2} />
          <TextareaInput name="damage" label="Damage seen" optional rows={2} />
          <TextareaInput name="notes" label="Notes" optional rows={2} className="full" />
          {few ? <Checkbox name="fewPhotosOk" label={`Fewer than ${sheet.photosWanted} photos: it is so`} className="full" /> : null}
        </div>
        <div className="form-act"><SubmitButton pendingText="Booking in…">Book in</SubmitButton></div>
      </CommandForm>
    </Bays>
  );
}
