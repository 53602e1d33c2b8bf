"use client";
import { useMemo, useState, type KeyboardEvent } from "react";
import { ACCOUNTS } from "@/modules/books/domain/accounts";
import { amount, money, shortDate } from "@/modules/kernel/format";
import { Button } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { Flag } from "@/modules/ui/flag";
import { KeyHints } from "@/modules/ui/key-hints";
import { Joint } from "@/modules/ui/mark";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { useAct } from "@/modules/ui/use-act";
import { lockMatchAction, unlockMatchAction } from "../actions";
import type { BoardLine, BoardTarget, MatchBoard as Board } from "../bank-board";
import { PayoutParts } from "./payout-parts";

const FREE_ACCOUNTS = ACCOUNTS.filter((a) => !["1010", "1020", "1100", "2100", "2110"].includes(a.code));

/** Bank lines at the left, what they paid at the right; two keepers close on the stem when a person locks them. */
export function MatchBoard({ board }: { board: Board }) {
  const place = usePlace();
  const toast = useToast();
  const [at, setAt] = useState(() => board.lines.find((l) => l.state === "proposed")?.id ?? board.lines[0]?.id ?? "");
  const [picked, setPicked] = useState<Record<string, string[]>>({});
  const [rest, setRest] = useState<"leave" | "write-off">("leave");
  const [account, setAccount] = useState("");
  const lock = useAct(lockMatchAction.bind(null, place.slug), () => { toast({ text: "Locked" }); setRest("leave"); setAccount(""); });
  const unlock = useAct(unlockMatchAction.bind(null, place.slug), () => toast({ text: "Unlocked" }));
  const targetOf = useMemo(() => new Map(board.targets.map((t) => [t.id, t])), [board.targets]);
  const line = board.lines.find((l) => l.id === at);
  const chosenOf = (l: BoardLine): BoardTarget[] => (picked[l.id] ?? l.targets.map((t) => t.id)).flatMap((id) => targetOf.get(id) ?? []);
  const used = new Set(board.lines.filter((l) => l.state === "proposed" || picked[l.id]).flatMap((l) => chosenOf(l).map((t) => t.id)));
  const free = board.targets.filter((t) => !used.has(t.id));
  const chosen = line ? chosenOf(line) : [];
  const [first] = chosen;
  const difference = line && first?.kind === "invoice" ? line.amountMinor - chosen.reduce((a, t) => a + t.amountMinor, 0) : 0;

  const doLock = () => {
    if (!line || line.state === "locked") return;
    if (!first) { if (account) void lock.run({ lineId: line.id, version: line.version, kind: "account", account }); return; }
    void lock.run({ lineId: line.id, version: line.version, kind: first.kind, ids: chosen.map((t) => t.id), rest });
  };
  const doUnlock = () => { if (line?.state === "locked") void unlock.run({ lineId: line.id, version: line.version }); };
  const onKey = (e: KeyboardEvent) => {
    const i = board.lines.findIndex((l) => l.id === at);
    const go = (n: number) => { const next = board.lines[n]; if (next) { setAt(next.id); document.getElementById(`bank-${next.id}`)?.focus(); } };
    if (e.key === "ArrowDown") { e.preventDefault(); go(i + 1); }
    else if (e.key === "ArrowUp") { e.preventDefault(); go(i - 1); }
    else if (e.key === "ArrowRight" && free[0]) { e.preventDefault(); document.getElementById(`free-${free[0].id}`)?.focus(); }
    else if (e.key === "Enter") { e.preventDefault(); doLock(); }
    else if (e.key === "Backspace") { e.preventDefault(); doUnlock(); }
  };
  if (board.lines.length === 0) return <EmptyState title="No bank lines yet">Take in a file from the bank: each line stands here against what it most likely paid.</EmptyState>;
  const a = (minor: number) => amount(minor, place);
  return (
    <>
      <div className="jb">
        <div className="jb-h"><h2>Bank lines</h2><span className="sm mid">{board.file ? `from ${board.file.name}` : ""}</span></div><span className="hide-s" />
        <div className="jb-h two"><h2>Open invoices, payouts, checks</h2><span className="sm mid">{money(board.openMinor, place)} open</span></div>
        {board.lines.map((l) => {
          const targets = chosenOf(l);
          const isCurrent = l.id === at;
          return [
            <button key={`b${l.id}`} id={`bank-${l.id}`} type="button" className={`jb-c bk${l.state === "locked" ? " on" : ""}${isCurrent ? " cur" : ""}`} aria-pressed={isCurrent} onClick={() => setAt(l.id)} onFocus={() => setAt(l.id)} onKeyDown={onKey}>
              <span className="mid q">{shortDate(l.date, place.locale).split(" ").slice(1).join(" ")}</span><span>{l.text || "No text"}</span><b className="num amt">{a(l.amountMinor)}</b>{l.state === "locked" ? <span className="sr-only">locked</span> : null}
            </button>,
            <div key={`m${l.id}`} className={`jb-m${l.state === "locked" ? "" : targets.length ? " pro" : " none"}`}>
              {l.state === "locked" || targets.length ? <Joint state={l.state === "locked" ? "locked" : "proposed"} /> : <span />}
              <em>{picked[l.id] ? "picked by you" : l.why}</em>
            </div>,
            l.state === "locked" || targets.length ? (
              <div key={`t${l.id}`} className={`jb-c iv${l.state === "locked" ? " on" : ""}${isCurrent ? " cur" : ""}`}>
                <b className="num amt">{a(l.state === "locked" ? l.amountMinor : targets.reduce((x, t) => x + t.amountMinor, 0))}</b>
                <span>{l.state === "locked" ? l.lockedTo : <><b>{targets.map((t) => t.label).join(", ")}</b> {targets.map((t) => t.name).join(", ")}</>}</span>
                <span className="sm mid">{l.state === "locked" ? "Locked" : targets[0]?.note || (targets[0]?.dueOn ? `Due ${shortDate(targets[0].dueOn, place.locale)}` : "")}</span>
              </div>
            ) : <div key={`t${l.id}`} className="sm mid px-4">{l.amountMinor < 0 ? "Money out: book it to an account below." : "Pick what it paid from the list below."}</div>,
          ];
        })}
      </div>
      {line && line.state !== "locked" ? (
        <div className="jb-lock" role="group" aria-label="Lock the picked line">
          {first?.kind === "invoice" && difference < 0 ? (
            <>
              <span className="nw"><b>{first.label}</b>, {a(-difference)} short:</span>
              <label><input type="radio" name="rest" checked={rest === "leave"} onChange={() => setRest("leave")} />Leave {money(-difference, place)} open</label>
              <label><input type="radio" name="rest" checked={rest === "write-off"} onChange={() => setRest("write-off")} disabled={chosen.length > 1} />Write off {money(-difference, place)}{-difference > board.writeOffLimitMinor ? " (owner)" : ""}</label>
            </>
          ) : first?.kind === "invoice" && difference > 0 ? <span><b>{money(difference, place)} over:</b> it becomes the customer’s credit.</span> : first ? <span><b>{chosen.map((t) => t.label).join(", ")}</b>, {a(line.amountMinor)}: {first.kind === "invoice" ? "pays it in full" : first.kind === "payout" ? "the parts come to it" : "booked before, this only ties it"}</span> : null}
          {first ? null : (
            <label>Book to <select value={account} onChange={(e) => setAccount(e.target.value)} className="in"><option value="">choose an account</option>{FREE_ACCOUNTS.map((x) => <option key={x.code} value={x.code}>{x.code} {x.name}</option>)}</select></label>
          )}
          {picked[line.id] ? <Button variant="lo" onClick={() => setPicked(({ [line.id]: _, ...others }) => others)}>Back to the proposal</Button> : null}
          <Button variant="go" keycap="Enter" pending={lock.pending} pendingText="Locking…" onClick={doLock} {...(!first && !account ? { disabledReason: "Pick what it paid, or an account." } : {})}>Lock this match</Button>
        </div>
      ) : line ? <div className="jb-lock"><span>{line.lockedTo}</span><Button className="ms-auto" pending={unlock.pending} pendingText="Unlocking…" keycap="Backspace" onClick={doUnlock}>Unlock</Button></div> : null}
      {lock.trouble ?? unlock.trouble ? <Note tone="stop" live className="mt-3">{(lock.trouble ?? unlock.trouble)?.text}</Note> : null}
      {first?.kind === "payout" ? <PayoutParts payout={first} invoices={board.targets.filter((t) => t.kind === "invoice")} /> : null}
      <div className="mt-3"><KeyHints hints={[{ keys: ["↑", "↓"], does: "line" }, { keys: ["→"], does: "pick" }, { keys: ["Enter"], does: "lock" }, { keys: ["Backspace"], does: "unlock" }]} /></div>
      {free.length ? (
        <section className="mt-6" aria-label="Everything open">
          <h2 className="section-h">Everything else that is open</h2>
          <div className="grid gap-0">
            {free.map((t) => (
              <button
                key={t.id} id={`free-${t.id}`} type="button" className="jb-c iv" disabled={!line || line.state === "locked"}
                onClick={() => line && setPicked({ ...picked, [line.id]: t.kind === "invoice" && first?.kind === "invoice" && picked[line.id] ? [...(picked[line.id] ?? []), t.id] : [t.id] })}
              >
                <b className="num amt">{a(t.amountMinor)}</b><span><b>{t.label}</b> {t.name}</span><span className="sm mid">{t.daysLate > 0 ? <Flag>{t.daysLate} days late</Flag> : t.note || (t.dueOn ? `Due ${shortDate(t.dueOn, place.locale)}` : "")}</span>
              </button>
            ))}
          </div>
        </section>
      ) : null}
    </>
  );
}
