"use client";
import { useRouter } from "next/navigation";
import { Bay, Bays } from "@/modules/ui/bay";
import { CommandForm } from "@/modules/ui/form/command-form";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { refuseReleaseAction, releasePieceAction } from "../actions";
import { CHECKLIST } from "../domain/release-check";
import type { TrayKind } from "../domain/tray-kinds";
import { refuseReleaseInput, releaseInput } from "../input";

export interface InspectSheet { pieceId: string; version: number; number: string; tag: string; came: Record<string, number>; missing: string[] }

/** Final inspection: the checklist, the tray counted out, and the release, or back to work with words. */
export function InspectForm({ sheet }: { sheet: InspectSheet }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const kinds = Object.keys(sheet.came).filter((k) => (sheet.came[k] ?? 0) > 0) as TrayKind[];
  const back = `/s/${slug}/orders/${sheet.number}`;
  const form = useCommandForm({
    schema: releaseInput, draft: `inspect-${sheet.pieceId}`,
    defaultValues: { pieceId: sheet.pieceId, version: sheet.version, checked: [], tray: kinds.map((kind) => ({ kind, fitted: "0", returned: "0", scrapped: "0" })), note: "" },
    action: (sent) => releasePieceAction(slug, sent),
    onDone: () => { toast({ text: `${sheet.tag} released` }); router.push(back); },
  });
  const backToWork = useCommandForm({
    schema: refuseReleaseInput, defaultValues: { pieceId: sheet.pieceId, reason: "" }, action: (sent) => refuseReleaseAction(slug, sent),
    onDone: () => { toast({ text: `${sheet.tag} goes back to work` }); router.push(back); },
  });
  return (
    <Bays>
      {sheet.missing.length > 0 ? (
        <Note title="Not yet ready to leave."><ul>{sheet.missing.map((m) => <li key={m}>{m}</li>)}</ul></Note>
      ) : null}
      <Bay label="Release">
        <CommandForm form={form} label="Final inspection" toFix="before the head is released">
          <fieldset>
            <legend className="eng ink mb-2">Looked at</legend>
            {CHECKLIST.map((c) => (
              <div key={c.key} className="tick mb-2">
                <input type="checkbox" id={`check-${c.key}`} value={c.key} {...form.rhf.register("checked")} />
                <label htmlFor={`check-${c.key}`}>{c.words}</label>
              </div>
            ))}
          </fieldset>
          {kinds.map((kind, i) => (
            <fieldset key={kind} className="mt-4">
              <legend className="eng ink mb-2">{kind}: {sheet.came[kind]} came in</legend>
              <div className="fields three">
                <NumberInput name={`tray.${i}.fitted`} label="Fitted" whole alignEnd />
                <NumberInput name={`tray.${i}.returned`} label="Go back" whole alignEnd />
                <NumberInput name={`tray.${i}.scrapped`} label="Scrapped, agreed" whole alignEnd />
              </div>
            </fieldset>
          ))}
          <TextareaInput name="note" label="Note" optional rows={2} className="mt-4" />
          <p className="hint mt-3">Check valve to piston, coil bind and retainer to seal before the engine is started; the service manual comes first. Whoever ported the head does not release it.</p>
          <div className="form-act"><SubmitButton pendingText="Releasing…">Release {sheet.tag}</SubmitButton></div>
        </CommandForm>
      </Bay>
      <Bay label="Or back to work">
        <CommandForm form={backToWork} label="Back to work" toFix="before it goes back">
          <TextareaInput name="reason" label="What is to be mended" rows={2} />
          <div className="form-act"><SubmitButton variant="plain" pendingText="Sending back…">Send back to work</SubmitButton></div>
        </CommandForm>
      </Bay>
    </Bays>
  );
}
