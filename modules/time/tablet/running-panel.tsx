"use client";

import clsx from "clsx";
import { clock, hours, time } from "@/modules/kernel/format";
import { Icon } from "@/modules/ui/icon";
import { Tag } from "@/modules/ui/tag";
import { Tube } from "@/modules/ui/tube";
import type { BoardJob, BoardPerson, ClockBoard } from "../board";
import { useNow } from "./use-ticking";
import { capital } from "./words";

/** The fluid panel of what runs. Without a link it drains to an outline and goes on. */
export function RunningPanel({ board, person, job, linked, onDone, onStop }: {
  board: ClockBoard; person: BoardPerson; job: BoardJob | undefined; linked: boolean; onDone: () => void; onStop: () => void;
}) {
  const now = useNow();
  const since = person.running?.since ?? board.at;
  const seconds = Math.max(0, Math.floor((now - new Date(since).getTime()) / 1000));
  const minutes = Math.floor(seconds / 60);
  const done = (job?.doneMinutes ?? 0) + minutes;
  const left = (job?.bookMinutes ?? 0) - done;
  const { locale } = board.shop;
  return (
    <section className={clsx("now-panel", !linked && "drained")} aria-label="Running now">
      <div className="flex items-baseline justify-between gap-4">
        <h1 className="eng" style={{ fontSize: "0.9375rem" }}>{linked ? "Running now" : "Running, kept on this tablet"}</h1>
        <span className="eng nw" style={{ fontSize: "0.9375rem" }}>{linked && job ? `${capital(job.station)}, ${board.device.name}` : board.device.name}</span>
      </div>
      <p className="op">{job ? job.operation : capital(person.running?.indirect ?? "An operation")}</p>
      {job ? <p className="flex flex-wrap items-center gap-3 text-lead font-semibold"><Tag running={!linked}>{job.tag}</Tag>{job.customer}, {job.family}</p> : null}
      {job?.note ? <div className="k-note"><b>From the counter</b>{job.note}</div> : null}
      <p className="num el" aria-label={`${Math.floor(minutes / 60)} hours ${minutes % 60} minutes, since ${time(since, board.shop)}`}>{clock(seconds)}<small>h</small></p>
      {job ? (
        <>
          <Tube value={done} mark={Math.max(job.bookMinutes, 1)} size="xl" />
          <div className="k-scale"><span>{hours(done, locale)} h done</span><span>{left >= 0 ? `${hours(left, locale)} h left of` : `${hours(-left, locale)} h over`} {hours(job.bookMinutes, locale)} book</span></div>
        </>
      ) : null}
      <div className="mt-[22px] flex gap-[10px]">
        {job ? <button type="button" className="k-key k1" onClick={onDone}><Icon name="check" size={26} weight={2} />Operation done</button> : null}
        <button type="button" className="k-key" onClick={onStop}><Icon name="stop" size={24} weight={2} />Stop clock</button>
      </div>
    </section>
  );
}
