"use client";

import { useRouter } from "next/navigation";
import { Bay, Bays } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { CommandForm } from "@/modules/ui/form/command-form";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { refuseReleaseAction, releasePieceAction } from "../actions";
import { CHECKLIST } from "../domain/release-check";
import type { TrayKind } from "../domain/tray-kinds";
import { refuseReleaseInput, releaseInput } from "../input";
import { CommandDialog } from "./command-dialog";

/** Where a loose part that came in is now. */
const FATES = [["fitted", "fitted"], ["returned", "go back"], ["scrapped", "scrapped, agreed"]] as const;

/** Final inspection of one piece: what is missing named first, then the list to tick and the tray to account for. */
export function InspectForm({ pieceId, version, tag, came, missing, alone, back }: { pieceId: string; version: number; tag: string; came: Readonly<Record<string, number>>; missing: readonly string[]; alone: boolean; back: string }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const kinds = Object.entries(came).filter(([, n]) => n > 0);
  const form = useCommandForm({
    schema: releaseInput, draft: `inspect-${pieceId}`,
    defaultValues: { pieceId, version, checked: [], tray: kinds.map(([kind]) => ({ kind: kind as TrayKind, fitted: "0", returned: "0", scrapped: "0" })), note: "" },
    action: (sent) => releasePieceAction(slug, { ...sent, input: { ...sent.input, version } }),
    onDone: (v) => {
      toast({ text: `${tag} is released${v.alone ? ", alone" : ""}` });
      router.push(back);
      router.refresh();
    },
  });
  const rows = form.rhf.watch("tray");
  return (
    <CommandForm
      form={form} toFix="before it is released" label="Final inspection"
      troubleText={(code, data) => (code === "NOT_READY" ? <><b>Not released.</b><ul className="mt-1">{String(data.missing ?? "").split("\n").map((m) => <li key={m}>{m}</li>)}</ul></> : undefined)}
    >
      {missing.length > 0 ? <Note tone="warn" title="Still in the way:"><ul className="mt-1">{missing.map((m) => <li key={m}>{m}</li>)}</ul></Note> : <Note tone="info" title="All operations are done.">Look, tick, account for the tray, release.</Note>}
      {alone ? <div className="mt-2"><Note tone="warn">You ported this head and there is nobody else. It is allowed and marked “alone”.</Note></div> : null}
      <Bays className="mt-6">
        <Bay label="Looked at">
          {CHECKLIST.map((c) => (
            <label key={c.key} className="tick" style={{ minHeight: 44 }}><input type="checkbox" value={c.key} {...form.rhf.register("checked")} /><span>{c.words}</span></label>
          ))}
        </Bay>
        <Bay label="Parts that came in" flush>
          {kinds.length === 0 ? <p className="mid px-[18px] pb-3 pt-1">No loose parts came with it.</p> : (
            <table className="calm">
              <thead><tr><th scope="col">Kind</th><th scope="col" className="r">Came</th><th scope="col">Fitted</th><th scope="col">Go back</th><th scope="col">Scrapped, agreed</th><th scope="col" className="r">Open</th></tr></thead>
              <tbody>
                {kinds.map(([kind, n], i) => {
                  const row = rows?.[i];
                  const left = n - (Number(row?.fitted) || 0) - (Number(row?.returned) || 0) - (Number(row?.scrapped) || 0);
                  return (
                    <tr key={kind}>
                      <td className="b">{kind}</td><td className="r q">{n}</td>
                      {FATES.map(([f, words]) => <td key={f} style={{ minWidth: 76 }}><NumberInput hideLabel whole name={`tray.${i}.${f}`} label={`${kind}, ${words}`} /></td>)}
                      <td className="r q b">{left === 0 ? "0" : left}</td>
                    </tr>
                  );
                })}
              </tbody>
            </table>
          )}
        </Bay>
        <Bay label="Note"><TextInput name="note" label="Note" optional /></Bay>
      </Bays>
      <div className="form-act">
        <SubmitButton hotkey="F9" icon="check" pendingText="Releasing…">Release {tag}</SubmitButton>
        <CommandDialog
          trigger={<Button>Not yet, back to work</Button>} title={`Send ${tag} back to work?`} submit="Send it back" schema={refuseReleaseInput} values={{ pieceId, reason: "" }} action={(s) => refuseReleaseAction(slug, s)} done={() => `${tag} goes back to work`} onDone={() => router.push(back)}
        >
          <TextareaInput name="reason" label="What is to be mended" rows={3} />
        </CommandDialog>
      </div>
    </CommandForm>
  );
}
