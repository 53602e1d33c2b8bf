"use client";

import { useState } from "react";
import { time } from "@/modules/kernel/format";
import { Icon } from "@/modules/ui/icon";
import { Tag } from "@/modules/ui/tag";
import type { BoardJob, ClockBoard } from "../board";
import { INDIRECT_WORK } from "../domain/indirect-work";
import { about, capital } from "./words";

/** Open work to start or switch to, the likeliest first. */
export function WorkList({ board, jobs, title, few, onPick }: { board: ClockBoard; jobs: readonly BoardJob[]; title: string; few: number; onPick: (job: BoardJob) => void }) {
  const [all, setAll] = useState(false);
  const shown = all ? jobs : jobs.slice(0, few);
  return (
    <div>
      <div className="k-h"><h2 className="eng">{title}</h2><span className="mid nw"><Icon name="badge" className="inline align-[-4px]" /> or scan a head tag</span></div>
      <div className="k-list">
        {shown.map((job) => (
          <button key={job.operationId} type="button" className="k-row" disabled={job.waits !== null} onClick={() => onPick(job)}>
            <Tag>{job.tag}</Tag>
            <span className="min-w-0"><b>{job.operation}</b><span className="mid block">{job.readyAt ? `Cure until ${time(job.readyAt, board.shop)}` : about(job, board.shop.locale)}</span></span>
            <span className="k-go" style={job.waits ? { borderStyle: "dashed" } : undefined}><Icon name={job.waits || job.readyAt ? "clock" : title === "Switch to" ? "swap" : "play"} size={26} weight={1.8} /></span>
          </button>
        ))}
        {jobs.length === 0 ? <p className="mid text-body">No open operation waits. Scan a head tag, or take something that is not on a head.</p> : null}
        {jobs.length > few ? <button type="button" className="k-key" style={{ minHeight: 64 }} aria-expanded={all} onClick={() => setAll(!all)}>{all ? "Fewer" : `${jobs.length - few} more`}</button> : null}
      </div>
    </div>
  );
}

const FIRST = ["clean-up", "break", "counter help"] as const;
const LABEL: Record<string, string> = { "counter help": "Help at counter" };

/** Time that belongs to no head; while something runs, the door's keys beside it. */
export function NotOnAHead({ onPick, door }: { onPick: (work: string) => void; door?: { onMeal: () => void; onOut: () => void } }) {
  const [all, setAll] = useState(false);
  const rest = INDIRECT_WORK.filter((w) => !(FIRST as readonly string[]).includes(w));
  const key = (w: string) => <button key={w} type="button" className="k-key" onClick={() => onPick(w)}>{LABEL[w] ?? capital(w)}</button>;
  return (
    <div>
      <div className="k-h" style={{ margin: "20px 0 0" }}><h2 className="eng">Not on a head</h2></div>
      <div className="k-other">
        {FIRST.map(key)}
        {all ? rest.map(key) : null}
        <button type="button" className={door ? "k-key" : "k-key col-span-3"} aria-expanded={all} onClick={() => setAll(!all)}>{all ? "Fewer" : door ? "Other" : "Waiting, set-up, training and others"}</button>
        {door ? <><button type="button" className="k-key" onClick={door.onMeal}>Meal</button><button type="button" className="k-key" onClick={door.onOut}>Clock out</button></> : null}
      </div>
    </div>
  );
}
