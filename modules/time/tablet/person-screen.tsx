"use client";

import { useRef, useState } from "react";
import { time } from "@/modules/kernel/format";
import { Icon } from "@/modules/ui/icon";
import { KioskStrip } from "@/modules/ui/kiosk-strip";
import { Note } from "@/modules/ui/note";
import { WallClock } from "@/modules/ui/wall-clock";
import type { BoardJob, BoardPerson, ClockBoard } from "../board";
import { elapsedMinutes } from "../domain/elapsed";
import { jobsFor } from "./kept-board";
import { LeftPanel, ReasonPanel } from "./ask-panel";
import { NotOnAHead, WorkList } from "./choices";
import { KeptList } from "./kept-list";
import { RunningPanel } from "./running-panel";
import { useNow, useScanner, useUntouched } from "./use-ticking";
import type { Answer, AtTablet, PressOf, useTablet } from "./use-tablet";
import { capital, spell } from "./words";

const UNTOUCHED_MS = 10_000;
type Tablet = Omit<ReturnType<typeof useTablet>, "board"> & { board: ClockBoard };

/** One person's screen: what runs, what next. Ten seconds without a touch and it is nobody's again. */
export function PersonScreen({ tablet, at, person, onLock }: { tablet: Tablet; at: AtTablet; person: BoardPerson; onLock: () => void }) {
  const { board, unlinkedSince, kept } = tablet;
  const place = { locale: board.shop.locale, zone: board.shop.zone };
  const linked = unlinkedSince === null;
  const now = useNow();
  const inFlight = useRef(new Set<string>());
  const [said, setSaid] = useState<string | null>(null);
  const [ask, setAsk] = useState<{ job: BoardJob; field: "leadReason" | "outOfOrderReason"; message: string } | null>(null);
  const [missing, setMissing] = useState(at.own?.missingOut ?? null);
  const [leftTrouble, setLeftTrouble] = useState<{ message: string; twice: boolean } | null>(null);
  const [scannedTag, setScannedTag] = useState<string | null>(null);
  useUntouched(ask || missing ? 60_000 : UNTOUCHED_MS, onLock);

  const act = async (p: PressOf): Promise<Answer> => {
    // Two taps of one key are one act; another key waits its turn.
    const key = `${p.press}:${p.operationId ?? p.work ?? ""}`;
    if (inFlight.current.has(key)) return { kind: "done" };
    inFlight.current.add(key);
    setSaid(null);
    const answer = await tablet.press(at, p).finally(() => inFlight.current.delete(key));
    if (answer.kind === "refused") setSaid(answer.message);
    return answer;
  };
  const start = async (job: BoardJob, more: Record<string, unknown> = {}) => {
    const isIn = person.door === "in";
    const answer = await act({
      press: isIn && person.running ? "switchTo" : "startOperation", operationId: job.operationId, word: isIn && person.running ? "Switch" : "Start", text: `${job.tag} ${job.operation}`,
      more: { ...more, ...(isIn ? {} : { doorIn: true }) },
    });
    setAsk(null);
    if (answer.kind === "refused" && (answer.code === "OUT_OF_ORDER" || ((answer.code === "CURE_NOT_OVER" || answer.code === "ON_HOLD") && more.leadReason === undefined))) {
      setAsk({ job, field: answer.code === "OUT_OF_ORDER" ? "outOfOrderReason" : "leadReason", message: answer.message });
      setSaid(null);
    } else if (answer.kind !== "refused") setScannedTag(null);
  };
  const sayLeft = async (leftAt: string, which?: "first" | "second") => {
    const answer = await act({ press: "sayWhenLeft", word: "Left", text: leftAt.replace("T", " "), more: { leftAt, ...(which ? { which } : {}) } });
    if (answer.kind === "refused") { setLeftTrouble({ message: answer.message, twice: answer.code === "TIME_EXISTS_TWICE" }); setSaid(null); } else setMissing(null);
  };
  useScanner((code) => {
    if (board.jobs.some((j) => j.tag === code)) { setScannedTag(code); setSaid(null); } else setSaid(`No open operation on a head with the tag ${code}. Ask the counter.`);
  });

  const jobs = jobsFor(board, person);
  const running = board.jobs.find((j) => j.operationId === person.running?.operationId);
  const shown = scannedTag ? jobs.filter((j) => j.tag === scannedTag) : jobs;
  const today = person.todayMinutes + (person.door === "in" && person.doorSince ? Math.max(0, elapsedMinutes(new Date(person.doorSince), new Date(now))) : 0);
  const sub = person.door === "in" && person.doorSince ? `In since ${time(person.doorSince, place)}, ${spell(today)} today` : person.door === "at meal" && person.doorSince ? `At a meal since ${time(person.doorSince, place)}` : `Off the clock${today > 0 ? `, ${spell(today)} today` : ""}`;
  const title = person.running ? "Switch to" : "Start";
  return (
    <div className="kiosk">
      <KioskStrip name={person.name} sub={sub} linked={linked} {...(unlinkedSince ? { since: time(unlinkedSince, place) } : {})} clock={<WallClock place={place} initial={time(board.at, place)} />} onLock={onLock} />
      <main id="main" className="k-cols">
        {person.running ? (
          <RunningPanel
            board={board} person={person} job={running} linked={linked}
            onDone={() => void act({ press: "operationDone", ...(running ? { operationId: running.operationId } : {}), word: "Done", text: running ? `${running.tag} ${running.operation}` : "" })}
            onStop={() => void act({ press: "stopClock", word: "Stop", text: running ? `${running.tag} ${running.operation}` : capital(person.running?.indirect ?? "") })}
          />
        ) : (
          <DoorPanel person={person} week={at.own} onPress={(press, word) => void act({ press, word, text: "at the door" })} />
        )}
        <section>
          <p role="alert" className={said ? "k-said on" : "k-said"}>{said ? <><Icon name="warn" size={22} /> <span>{said}</span></> : null}</p>
          {linked ? null : <Note tone="info" icon="unplug" big live title="Keep working.">Your times are written here first and sent when the link is back. Nothing is lost.</Note>}
          {kept.length > 0 ? <KeptList kept={kept} place={place} onTry={() => void tablet.sync()} /> : null}
          {missing ? <LeftPanel missing={missing} {...place} trouble={leftTrouble} linked={linked} onSay={(leftAt, which) => void sayLeft(leftAt, which)} />
            : ask ? <ReasonPanel title={ask.job.operation} message={ask.message} onBack={() => setAsk(null)} onReason={(reason) => void start(ask.job, { [ask.field]: reason })} />
            : (
              <>
                <div className={linked && kept.length === 0 ? "" : "mt-5"}><WorkList key={scannedTag ?? ""} board={board} jobs={shown} title={scannedTag ? `Head ${scannedTag}` : title} few={linked ? 3 : 2} onPick={(job) => void start(job)} /></div>
                <NotOnAHead {...(person.running ? { door: { onMeal: () => void act({ press: "mealOut", word: "Meal", text: "at the door" }), onOut: () => void act({ press: "doorOut", word: "Out", text: "at the door" }) } } : {})} onPick={(work) => void act({ press: "startIndirect", work, word: person.running ? "Switch" : "Start", text: capital(work), more: person.door === "in" ? {} : { doorIn: true } })} />
                {linked ? (at.own ? <p className="mid mt-3 text-body">This week {spell(at.own.weekMinutes)}{at.own.overtimeMinutes > 0 ? `, of it ${spell(at.own.overtimeMinutes)} over 40 h` : ""}.</p> : null) : (
                  <>
                    <div className="k-h" style={{ margin: "20px 0 0" }}><h2 className="eng">Needs the link</h2></div>
                    <div className="k-other two"><button type="button" className="k-key" disabled>Hours this week</button><button type="button" className="k-key" disabled>Lead override</button></div>
                  </>
                )}
              </>
            )}
        </section>
      </main>
    </div>
  );
}

/** Nothing runs: the door's keys. */
function DoorPanel({ person, week, onPress }: { person: BoardPerson; week: { weekMinutes: number } | null; onPress: (press: "doorIn" | "doorOut" | "mealOut" | "mealIn", word: string) => void }) {
  const isIn = person.door === "in";
  return (
    <section className="k-door">
      <h1 className="eng">{isIn ? "Nothing running" : person.door === "at meal" ? "At a meal" : "Off the clock"}</h1>
      <p className="op">{isIn ? "Start the next one at the right" : person.door === "at meal" ? "Back from the meal?" : "Clock in, or start an operation"}</p>
      {week ? <p className="mid text-body">{spell(week.weekMinutes)} this week</p> : null}
      <div className="mt-auto grid gap-[10px]">
        {isIn ? (
          <>
            <button type="button" className="k-key" onClick={() => onPress("mealOut", "Meal")}>Meal</button>
            <button type="button" className="k-key" onClick={() => onPress("doorOut", "Out")}>Clock out</button>
          </>
        ) : person.door === "at meal" ? (
          <>
            <button type="button" className="k-key k1" style={{ minHeight: 120 }} onClick={() => onPress("mealIn", "Back")}>Back from meal</button>
            <button type="button" className="k-key" onClick={() => onPress("doorOut", "Out")}>Clock out</button>
          </>
        ) : <button type="button" className="k-key k1" style={{ minHeight: 120, fontSize: "1.75rem" }} onClick={() => onPress("doorIn", "In")}>Clock in</button>}
      </div>
    </section>
  );
}
