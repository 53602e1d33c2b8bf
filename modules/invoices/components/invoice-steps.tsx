"use client";
import { useState } from "react";
import { useRouter } from "next/navigation";
import { date, dateTime, money } from "@/modules/kernel/format";
import { Bay } from "@/modules/ui/bay";
import { Button, LinkButton } from "@/modules/ui/button";
import { ConfirmDialog } from "@/modules/ui/dialog";
import { Icon } from "@/modules/ui/icon";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { useAct } from "@/modules/ui/use-act";
import { applyCreditAction, dropDraftAction, issueInvoiceAction, sendInvoiceAction, writeOffInvoiceAction } from "../actions";
import type { InvoicePageView } from "../queries";
import { CreditDialog } from "./credit-dialog";
import { DraftDialog } from "./draft-dialog";

const Check = ({ ok, children }: { ok: boolean; children: React.ReactNode }) => (
  <li className="flex items-start gap-2 py-1"><Icon name={ok ? "check" : "warn"} size={18} /><span>{children}</span></li>
);

/** Draft, issue, send, paid: where the paper stands and what comes next. F9 asks once, with the amount. */
export function InvoiceSteps({ view, may }: { view: InvoicePageView; may: { write: boolean; credit: boolean; writeOff: boolean; issueUnreleased: boolean } }) {
  const place = usePlace();
  const router = useRouter();
  const toast = useToast();
  const { snapshot: s } = view;
  const m = (minor: number) => money(minor, place);
  const isDraft = view.state === "draft";
  const now = isDraft ? 1 : view.openMinor > 0 ? (view.sentAt ? 4 : 3) : 4;
  const [asking, setAsking] = useState(false);
  const [givingUp, setGivingUp] = useState(false);
  const [why, setWhy] = useState("");
  const issue = useAct(issueInvoiceAction.bind(null, place.slug), (v: { number: string }) => { setAsking(false); toast({ text: `Invoice ${v.number} issued` }); });
  const send = useAct(sendInvoiceAction.bind(null, place.slug), (v: { to: string }) => toast({ text: `Sent to ${v.to}` }));
  const drop = useAct(dropDraftAction.bind(null, place.slug), () => router.push(`/s/${place.slug}/books?view=draft`));
  const credit = useAct(applyCreditAction.bind(null, place.slug), () => toast({ text: "Credit used" }));
  const writeOff = useAct(writeOffInvoiceAction.bind(null, place.slug), () => toast({ text: "Rest written off" }));
  const stopped = view.checks.waitingTags.length > 0 && !may.issueUnreleased;
  const trouble = issue.trouble ?? send.trouble ?? drop.trouble ?? credit.trouble ?? writeOff.trouble;
  return (
    <Bay label="Draft, issue, send">
      <ol className="steps-v">
        <li className={now === 1 ? "now" : undefined}>
          <i>1</i>
          <div>
            <h3>Draft</h3>
            <p className="mid sm">Filled from order {s.orderNumber}.{isDraft ? " Change any line on the sheet." : ""}</p>
            {isDraft ? (
              <>
                <ul className="sm mt-2">
                  <Check ok={view.checks.waitingTags.length === 0}>{view.checks.waitingTags.length === 0 ? "All pieces released" : `${view.checks.waitingTags.join(", ")} not released yet`}</Check>
                  <Check ok={view.checks.overApprovedMinor === 0}>{view.checks.overApprovedMinor === 0 ? "Within what was approved" : `${m(view.checks.overApprovedMinor)} more than approved`}</Check>
                  <Check ok={s.pieces.length > 0 && s.pieces.every((p) => p.gain.comparable)}>{s.pieces.length > 0 && s.pieces.every((p) => p.gain.comparable) ? "Gain measured" : "No gain is stated, and the sheet says why"}</Check>
                  {view.checks.minutesOverBook === 0 ? null : <Check ok={view.checks.minutesOverBook < 0}>{Math.abs(view.checks.minutesOverBook)} min {view.checks.minutesOverBook > 0 ? "over" : "under"} book. Billed at book, as agreed</Check>}
                </ul>
                {may.write ? (
                  <div className="mt-3 flex flex-wrap gap-2">
                    <DraftDialog view={view} />
                    <Button variant="lo" pending={drop.pending} onClick={() => void drop.run({ invoiceId: view.id, version: view.version })}>Take the draft away</Button>
                  </div>
                ) : null}
              </>
            ) : null}
          </div>
        </li>
        <li>
          <i>2</i>
          <div>
            <h3>Issue</h3>
            {isDraft ? (
              <>
                <p className="mid sm mb-3">Gives it the next number and books the sale. After this it can be credited, not changed.</p>
                {may.write ? (
                  <Button variant="go" hotkey="F9" keycap="F9" pending={issue.pending} pendingText="Issuing…" onClick={() => setAsking(true)} {...(stopped ? { disabledReason: "Waits for final inspection; a manager may issue it before." } : {})}>Issue {m(s.totals.totalMinor)}</Button>
                ) : <p className="sm">The bookkeeper issues it.</p>}
                <ConfirmDialog
                  open={asking} onOpenChange={setAsking} question={`Issue this invoice for ${m(s.totals.totalMinor)}?`} safe="Not yet" action="Issue it" pending={issue.pending} pendingText="Issuing…"
                  onAction={() => void issue.run({ invoiceId: view.id, version: view.version, totalMinor: s.totals.totalMinor, send: true }).then((done) => { if (!done) setAsking(false); })}
                >
                  {s.customer.name}, order {s.orderNumber}. {s.deposit.appliedMinor > 0 ? `${m(s.deposit.appliedMinor)} of deposit is taken off; ` : ""}{m(s.balanceMinor)} is left to pay. {view.sentTo ? `It is mailed to ${view.sentTo}.` : "There is no e-mail address: print it."}
                </ConfirmDialog>
              </>
            ) : <p className="mid sm">{s.number} of {date(s.date, place.locale)}.{view.pdfHash ? <> Paper kept, <span className="q" title={view.pdfHash}>{view.pdfHash.slice(0, 12)}…</span></> : " The paper is being made."}</p>}
          </div>
        </li>
        <li className={now === 3 ? "now" : undefined}>
          <i>3</i>
          <div>
            <h3>Send</h3>
            <p className="mid sm">{view.sentAt ? `Sent ${dateTime(view.sentAt, place)} to ${view.sentTo}.` : view.sentTo ? `Goes to ${view.sentTo} with the link to pay.` : "No e-mail address: print it."}</p>
            {!isDraft && may.write ? (
              <div className="mt-2 flex flex-wrap gap-2">
                {view.sentTo ? <Button variant="lo" icon="send" pending={send.pending} pendingText="Sending…" onClick={() => void send.run({ invoiceId: view.id })}>{view.sentAt ? "Send again" : "Send"}</Button> : null}
                {view.pdfFileId ? <LinkButton variant="lo" icon="print" href={`/s/${place.slug}/books/invoices/${view.id}/pdf`} newTab prefetch={false}>Print</LinkButton> : null}
              </div>
            ) : null}
          </div>
        </li>
        <li className={now === 4 ? "now" : undefined}>
          <i>4</i>
          <div>
            <h3>Paid</h3>
            <p className="mid sm">{s.deposit.appliedMinor > 0 ? `Deposit ${m(s.deposit.appliedMinor)} used. ` : ""}{isDraft ? `${m(s.balanceMinor)} will be to pay.` : view.openMinor > 0 ? `${m(view.openMinor)} to pay${s.dueOn === s.date ? " on receipt" : ` by ${date(s.dueOn, place.locale)}`}.` : "Paid in full."}</p>
            {!isDraft && view.kind === "invoice" ? (
              <div className="mt-2 flex flex-wrap gap-2">
                {view.creditHeldMinor > 0 && view.openMinor > 0 && may.write ? <Button variant="lo" pending={credit.pending} onClick={() => void credit.run({ invoiceId: view.id })}>Use credit of {m(Math.min(view.creditHeldMinor, view.openMinor))}</Button> : null}
                {view.openMinor > 0 && may.writeOff ? (
                  <ConfirmDialog
                    open={givingUp} onOpenChange={setGivingUp} trigger={<Button variant="lo">Write off</Button>} question={`Write off ${m(view.openMinor)} of ${s.number ?? ""}?`} safe="Keep it open" action="Write it off" pending={writeOff.pending} pendingText="Writing off…"
                    onAction={() => void writeOff.run({ invoiceId: view.id, reason: why || "Short payment" }).then(() => setGivingUp(false))}
                  >
                    <div className="field"><label htmlFor="wo-why">Why nobody will pay it</label><div className="in"><input id="wo-why" value={why} maxLength={240} onChange={(e) => setWhy(e.target.value)} /></div></div>
                  </ConfirmDialog>
                ) : null}
                {may.credit ? <CreditDialog view={view} /> : null}
              </div>
            ) : null}
            {view.credits.map((c) => <p key={c.id} className="sm mt-2"><a className="lk" href={`/s/${place.slug}/books/invoices/${c.id}`}>Credit note {c.number}</a>, {m(-c.totalMinor)} of {date(c.on, place.locale)}</p>)}
          </div>
        </li>
      </ol>
      {trouble ? <Note tone="stop" live>{trouble.text}</Note> : null}
    </Bay>
  );
}
