"use client";

import { date, dateTime, money } from "@/modules/kernel/format";
import { Bay } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import type { DialName } from "@/modules/ui/dial";
import { usePlace } from "@/modules/ui/place";
import { Status } from "@/modules/ui/status";
import { useToast } from "@/modules/ui/toast";
import { ESTIMATE_STATE_WORDS } from "../domain/estimate-snapshot";
import type { VersionView } from "../queries/estimates";

const DIAL: Record<string, DialName> = { draft: "draft", sent: "wait", approved: "out", declined: "hold", replaced: "queue", expired: "late" };

/** Every version with its paper, its link and its answer. */
export function VersionsBay({ number, versions, aside }: { number: string; versions: readonly VersionView[]; aside?: React.ReactNode }) {
  const place = usePlace();
  const toast = useToast();
  const copy = async (link: string) => {
    try {
      await navigator.clipboard.writeText(link);
      toast({ text: "Link copied" });
    } catch {
      toast({ text: "The browser did not let us copy. Open the page and copy its address.", tone: "failed" });
    }
  };
  return (
    <Bay label="Estimate versions" aside={aside}>
      {versions.length === 0 ? <p className="mid">Nothing was estimated yet.</p> : (
        <ul>
          {versions.map((v, i) => {
            const state = v.isOutOfDate ? "expired" : v.state;
            return (
              <li key={v.id} className={i === 0 ? undefined : "mt-3 border-t border-line pt-3"}>
                <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1">
                  <span><b className="b">Version {v.estimateNo}</b>{v.totalMinor === null ? null : <> <span className="q">{money(v.totalMinor, place)}</span></>}{v.changeMinor ? <span className="mid sm"> ({money(v.changeMinor, place)})</span> : null}</span>
                  <Status dial={DIAL[state] ?? "queue"}>{ESTIMATE_STATE_WORDS[state]}</Status>
                </div>
                <p className="sm mid">{[
                  v.sentAt ? `Sent ${dateTime(v.sentAt, place)}${v.sentTo ? ` to ${v.sentTo}` : ", in print"}` : null, v.openedAt ? `opened ${dateTime(v.openedAt, place)}` : v.state === "sent" ? "not opened" : null,
                  v.state === "sent" && v.validUntil ? `good until ${date(v.validUntil, place.locale)}` : null, v.answer ? `${v.answer.name} ${v.answer.via === "link" ? "by link" : v.answer.via === "phone" ? `by phone, ${v.answer.takenBy ?? ""}` : `at the counter, ${v.answer.takenBy ?? ""}`} ${dateTime(v.answer.at, place)}` : null,
                ].filter(Boolean).join("; ")}</p>
                {v.state === "draft" ? null : (
                  <p className="sm mt-1 flex gap-4">
                    <a className="lk" href={`/s/${place.slug}/orders/${number}/estimate/${v.estimateNo}/paper`} target="_blank" rel="noopener">Paper<span className="sr-only"> of version {v.estimateNo}, opens in a new tab</span></a>
                    {v.link ? <Button size="sm" variant="lo" onClick={() => void copy(v.link ?? "")}>Copy link</Button> : null}
                  </p>
                )}
              </li>
            );
          })}
        </ul>
      )}
    </Bay>
  );
}
