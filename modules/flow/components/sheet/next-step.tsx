"use client";
import { useState } from "react";
import { Button, LinkButton } from "@/modules/ui/button";
import { ConfirmDialog } from "@/modules/ui/dialog";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { settles, type Reply } from "@/modules/ui/form/reply";
import { RequestIds } from "@/modules/ui/form/request-id";
import { completeTestAction, correctTestAction, issueComparisonAction, voidTestAction } from "../../actions";
import type { RawTest } from "../../domain/raw-test";
import type { BenchGear, FlowSheet } from "../../queries/sheet";
import { unreadLifts, type UnreadLifts } from "../../domain/unread-lifts";
import { FinishDialog, ZeroReturn, type EmptyAct } from "./finish-dialog";
import { PURPOSE_WORDS, StartSheetDialog } from "./start-sheet-form";
import type { SheetFigures } from "./sheet-figures";

const troubleOf = (reply: Reply<unknown> | null): string => {
  if (reply === null) return "No answer. What you typed is kept; try again in a moment.";
  if (reply.status === "refused" || reply.status === "conflict") return reply.message;
  if (reply.status === "signed-out") return "Sign in again, then press once more.";
  if (reply.status === "error") return `Something broke on our side. Quote ${reply.reference}.`;
  return "That could not be done.";
};

/** A reason asked before something is put out of use or opened again. */
function ReasonDialog({ label, question, action, onAction }: { label: string; question: string; action: string; onAction: (reason: string) => void }) {
  const [reason, setReason] = useState("");
  const [open, setOpen] = useState(false);
  const [isAsked, setAsked] = useState(false);
  const lacks = reason.trim().length < 3;
  return (
    <ConfirmDialog open={open} onOpenChange={(to) => { setOpen(to); setAsked(false); }} trigger={<Button size="sm" variant="lo">{label}</Button>} question={question} safe="Leave it" action={action} onAction={() => { setAsked(true); if (!lacks) { setOpen(false); onAction(reason.trim()); } }}>
      <label className="field"><span className="label">Reason</span><span className="in"><input value={reason} onChange={(e) => setReason(e.target.value)} maxLength={300} aria-invalid={isAsked && lacks} aria-describedby="reason-says" /></span><span id="reason-says" className="err" role="alert">{isAsked && lacks ? "Say why in a few words." : ""}</span></label>
    </ConfirmDialog>
  );
}

/** The one next step of the sheet: start, finish, issue; and the rarer ones beside it. */
export function NextStep({ sheet, gear, figures, settle, onChanged }: { sheet: FlowSheet; gear: BenchGear; figures: SheetFigures; settle: () => Promise<string | null>; onChanged: () => void }) {
  const { slug, locale } = usePlace();
  const [pending, setPending] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const columns = figures.sides.flatMap((s) => [s.before, s.after]).flatMap((c) => (c ? [c.test] : []));
  const drafts = columns.filter((t) => t.state === "draft");
  const finished = columns.filter((t) => t.state === "complete");
  const newest = figures.sides.flatMap((s) => { const t = (s.after ?? s.before)?.test; return t?.state === "complete" ? [t] : []; });
  const basisOf = (when: "before" | "after"): { intake: RawTest | null; exhaust: RawTest | null } => ({ intake: figures.sides[0]?.[when]?.test ?? null, exhaust: figures.sides[1]?.[when]?.test ?? null });
  const before = basisOf("before");
  const hasBefore = before.intake !== null || before.exhaust !== null;
  const hasAfter = figures.sides.some((s) => s.after?.test.purpose === "after");

  // Pressed again after no answer, an act carries its first id: nothing is finished, voided or issued twice.
  const [ids] = useState(() => new RequestIds());
  const run = async (acts: { what: string; act: (requestId: string) => Promise<Reply<unknown>> }[]) => {
    setPending(true);
    setTrouble(null);
    for (const { what, act } of acts) {
      const reply = await act(ids.take(what)).catch(() => null);
      if (reply && settles(reply)) ids.settle(what);
      if (reply?.status !== "ok") {
        setTrouble(troubleOf(reply));
        setPending(false);
        onChanged();
        return;
      }
    }
    setPending(false);
    onChanged();
  };
  const [asking, setAsking] = useState<readonly UnreadLifts[] | null>(null);
  const [zero, setZero] = useState<Readonly<Record<string, string>>>({});
  const finish = async () => {
    setPending(true);
    const inTheWay = await settle();
    setPending(false);
    const holes = unreadLifts(drafts);
    if (inTheWay) setTrouble(inTheWay);
    else if (holes.length > 0 && !holes.every((h) => h.isEmpty && holes.length === drafts.length)) setAsking(holes);
    else await finishAll(drafts);
  };
  const voidAct = (t: RawTest, reason: string) => ({ what: `void ${t.id} ${reason}`, act: (requestId: string) => voidTestAction(slug, { requestId, input: { testId: t.id, version: t.version, reason } }) });
  const finishAll = (read: readonly RawTest[], empty: readonly RawTest[] = []) => run([
    ...read.map((t) => ({ what: `finish ${t.id} ${zero[t.id] ?? ""}`, act: (requestId: string) => completeTestAction(slug, { requestId, input: { testId: t.id, version: t.version, zeroReturn: zero[t.id] ?? "" } }) })),
    ...empty.map((t) => voidAct(t, "nothing was read")),
  ]);
  const finishAsked = (act: EmptyAct) => {
    const isEmpty = (t: RawTest) => asking?.some((h) => h.isEmpty && h.test.id === t.id) === true;
    setAsking(null);
    void finishAll(drafts.filter((t) => !isEmpty(t)), act === "void" ? drafts.filter(isEmpty) : []);
  };
  const issue = () => void run([{ what: "issue", act: (requestId) => issueComparisonAction(slug, { requestId, input: { headId: sheet.head.id, cylinder: sheet.cylinder, customerWords: "" } }) }]);
  const [latest] = sheet.comparisons;
  if (!sheet.canRecord) return latest ? <LinkButton href={`/s/${slug}/flow/reports/${latest.id}`} newTab icon="print">Report {latest.comparisonNo}</LinkButton> : null;
  return (
    <>
      {trouble ? <Note tone="warn" live title="Not done.">{trouble}</Note> : null}
      {asking ? <FinishDialog holes={asking} unit={drafts[0]?.liftUnit ?? "in"} locale={locale} onFinish={finishAsked} onLeave={() => setAsking(null)} /> : null}
      <div className="commit-bar">
        <span>
          <b>{drafts.length > 0 ? drafts.map((t) => `${t.side} ${PURPOSE_WORDS[t.purpose]}`).join(", ") : finished.length > 0 ? (hasAfter ? "Before and after are finished" : "Before test finished") : "Nothing read yet"}</b>{" "}
          <span className="mid">{drafts[0] ? `run ${drafts[0].runNo}, ${drafts[0].operator.name}` : ""}</span>
        </span>
        {drafts.length > 0 ? <ZeroReturn drafts={drafts} values={zero} onChange={(testId, text) => setZero({ ...zero, [testId]: text })} /> : null}
        <span className="ml-auto flex flex-wrap items-center gap-2">
          {drafts.length > 0 ? <ReasonDialog label="Void" question={`Void ${drafts.length > 1 ? "these tests" : "this test"}?`} action="Void it" onAction={(reason) => void run(drafts.map((t) => voidAct(t, reason)))} /> : null}
          {drafts.length === 0 ? newest.map((t) => <ReasonDialog key={t.id} label={`Correct ${t.side}`} question={`Correct the finished ${t.side} ${PURPOSE_WORDS[t.purpose]}?`} action="Correct it" onAction={(reason) => void run([{ what: `correct ${t.id} ${reason}`, act: (requestId) => correctTestAction(slug, { requestId, input: { testId: t.id, reason } }) }])} />) : null}
          {latest ? <LinkButton size="sm" href={`/s/${slug}/flow/reports/${latest.id}`} newTab icon="print">{`Report ${latest.comparisonNo}`}</LinkButton> : null}
          {drafts.length > 0 ? <Button variant="go" pending={pending} pendingText="Finishing…" onClick={() => void finish()}>{drafts.length > 1 ? "Finish both tests" : "Finish test"}</Button> : null}
          {drafts.length === 0 && !hasBefore ? <StartSheetDialog sheet={sheet} gear={gear} purpose="baseline" basis={{ intake: null, exhaust: null }} isMain onStarted={onChanged} /> : null}
          {drafts.length === 0 && hasBefore ? <StartSheetDialog sheet={sheet} gear={gear} purpose="interim" basis={before} isMain={false} onStarted={onChanged} /> : null}
          {drafts.length === 0 && hasBefore ? <StartSheetDialog sheet={sheet} gear={gear} purpose="after" basis={before} isMain={!hasAfter} onStarted={onChanged} /> : null}
          {drafts.length === 0 && hasAfter && sheet.canIssue ? <Button variant="go" pending={pending} pendingText="Issuing…" onClick={issue}>Issue report</Button> : null}
        </span>
      </div>
    </>
  );
}
