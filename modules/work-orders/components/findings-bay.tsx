"use client";

import { useRouter } from "next/navigation";
import { dateTime, money } from "@/modules/kernel/format";
import { Bay } from "@/modules/ui/bay";
import { Button, LinkButton } from "@/modules/ui/button";
import { usePlace } from "@/modules/ui/place";
import { Status } from "@/modules/ui/status";
import type { DialName } from "@/modules/ui/dial";
import { askAboutFindingAction, withdrawFindingAction } from "../actions";
import type { FindingRow } from "../queries/order-page";
import { FindingDialog } from "./finding-dialog";
import type { PieceName } from "./order-dialogs";
import { PhotoStrip } from "./photo-strip";
import { useToastAct } from "./use-toast-act";

const STATE: Record<FindingRow["state"], [DialName, string]> = {
  open: ["draft", "Not asked yet"], "in draft": ["draft", "In the next version"], asked: ["wait", "Waiting for the answer"], approved: ["out", "Approved"], declined: ["hold", "Declined"], withdrawn: ["out", "Taken back"],
};

/** Findings with their photos and answers; asking puts them into the next estimate version. */
export function FindingsBay({ number, findings, pieces, may }: { number: string; findings: readonly FindingRow[]; pieces: readonly PieceName[]; may: { finding: boolean; estimate: boolean; override: boolean } }) {
  const place = usePlace();
  const router = useRouter();
  const { act, pending } = useToastAct();
  const ask = (f: FindingRow) => act((requestId) => askAboutFindingAction(place.slug, { requestId, input: { findingId: f.id, version: f.version } }), () => { router.push(`/s/${place.slug}/orders/${number}/estimate`); return null; });
  const withdraw = (f: FindingRow) => act((requestId) => withdrawFindingAction(place.slug, { requestId, input: { findingId: f.id, version: f.version } }), () => "Finding taken back");
  return (
    <Bay label="Findings and approvals">
      {findings.length === 0 ? <p className="mid">Nothing was found beyond what is agreed.</p> : (
        <ul>
          {findings.map((f, i) => {
            const [dial, word] = STATE[f.state];
            return (
              <li key={f.id} className={i === 0 ? undefined : "mt-4 border-t border-line pt-4"}>
                <div className="flex flex-wrap items-start justify-between gap-x-6 gap-y-2">
                  <div className="min-w-0 flex-1" style={{ flexBasis: 260 }}>
                    <b className="b">{f.position ? `${f.position}: ` : ""}{f.words}</b>
                    <p className="sm mid">{[f.tag, `${f.foundBy}, ${dateTime(f.foundAt, place)}`, f.changeMinor !== null && f.state !== "open" ? `version ${f.estimateNo ?? ""}, ${money(f.changeMinor, place)}` : null, f.goOnMeanwhile ? null : "work waits"].filter(Boolean).join(". ")}</p>
                  </div>
                  <div className="flex flex-wrap items-center gap-2">
                    <Status dial={dial}>{word}{f.answeredAt ? ` ${dateTime(f.answeredAt, place)}` : ""}</Status>
                    {f.state === "open" && may.estimate ? <Button size="sm" icon="send" pending={pending} onClick={() => void ask(f)}>Ask customer</Button> : null}
                    {f.state === "in draft" && may.estimate ? <LinkButton size="sm" href={`/s/${place.slug}/orders/${number}/estimate`}>Price it</LinkButton> : null}
                    {f.state === "open" && may.override ? <Button size="sm" variant="lo" pending={pending} onClick={() => void withdraw(f)}>Take back</Button> : null}
                  </div>
                </div>
                <div className="mt-2"><PhotoStrip subject={{ kind: "finding", id: f.id }} photoIds={f.photoIds} label="Photo of the finding" mayAdd={may.finding && f.state !== "withdrawn"} /></div>
              </li>
            );
          })}
        </ul>
      )}
      {may.finding && pieces.length > 0 ? <div className="mt-4"><FindingDialog pieces={pieces} /></div> : null}
    </Bay>
  );
}
