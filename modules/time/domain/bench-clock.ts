import { ok, refuse, type Refused, type Result } from "@/modules/kernel/result";
import { cureMinutesLeft } from "./cure";
import { elapsedMinutes } from "./elapsed";
import { type IndirectWork } from "./indirect-work";

export type BenchPunchKind = "start" | "switch" | "stop" | "done";

/** A device clock this far ahead is believed; beyond it the punch is refused as a future time. */
export const CLOCK_AHEAD_SECONDS_MAX = 120;
/** A longer entry is asked about, not refused. */
export const LONG_ENTRY_MINUTES = 16 * 60;

/** What a person can be clocked on to. */
export type BenchWork =
  | {
      readonly kind: "operation";
      readonly operationId: string;
      /** Shown in words, e.g. `Exhaust porting, 260224-07`. */
      readonly label: string;
      /** End of a cure this operation has to wait for. */
      readonly readyAt?: Date | null;
      /** Label of an operation before this one that is still open. */
      readonly openBefore?: string | null;
      readonly isPieceGone?: boolean;
      readonly isDone?: boolean;
    }
  | { readonly kind: "indirect"; readonly work: IndirectWork };

export interface OpenBenchEntry {
  readonly work: BenchWork;
  readonly startedAt: Date;
}

export interface ClosedBenchEntry extends OpenBenchEntry {
  readonly endedAt: Date;
  readonly minutes: number;
  /** `done` was tapped: the operation is finished with this entry. */
  readonly isOperationDone: boolean;
}

export type BenchPunch =
  | { readonly kind: "start" | "switch"; readonly at: Date; readonly work: BenchWork; readonly leadReason?: string; readonly outOfOrderReason?: string }
  | { readonly kind: "stop" | "done"; readonly at: Date };

export interface BenchState {
  /** Whether the door clock of this person is in. */
  readonly isIn: boolean;
  readonly open: OpenBenchEntry | null;
}

export type BenchFlag = "cure overridden" | "out of order" | "longer than 16 h";

export interface BenchChange {
  readonly closed: ClosedBenchEntry | null;
  readonly open: OpenBenchEntry | null;
  /** Recorded with the entry for the lead to see. */
  readonly flags: readonly BenchFlag[];
}

/**
 * What one punch does to one person's bench clock. Pure: nothing is written here.
 * Refuses, and changes nothing:
 * `FUTURE_TIME`, `BEFORE_LAST_PUNCH`; `NOT_IN` (offer to clock in at the door first);
 * `ALREADY_RUNNING` with since when; `OTHER_RUNNING` (offer to switch); `NOTHING_RUNNING`;
 * `CURE_NOT_OVER` with minutes left, unless a lead gives a reason; `OUT_OF_ORDER` until a reason is given;
 * `OPERATION_DONE`; `PIECE_GONE` (offer a claim); `NOT_AN_OPERATION` for done on indirect work.
 */
export function punchBench(state: BenchState, punch: BenchPunch, now: Date): Result<BenchChange> {
  const timely = checkTime(state, punch.at, now);
  if (timely) return timely;
  if (punch.kind === "start" || punch.kind === "switch") return begin(state, punch);
  if (!state.open) return refuse("NOTHING_RUNNING", "Nothing is running on your bench clock. Scan a tag to start.");
  if (punch.kind === "done" && state.open.work.kind !== "operation") {
    return refuse("NOT_AN_OPERATION", `${state.open.work.kind === "indirect" ? state.open.work.work : "This"} has no end to tick. Use stop.`);
  }
  const closed = close(state.open, punch.at, punch.kind === "done");
  return ok({ closed, open: null, flags: longFlag(closed) });
}

function checkTime(state: BenchState, at: Date, now: Date): Refused | null {
  if (at.getTime() > now.getTime() + CLOCK_AHEAD_SECONDS_MAX * 1000) {
    return refuse("FUTURE_TIME", "This time has not come yet. Type a time up to now.", { field: "at", data: { now: now.toISOString() } });
  }
  if (state.open && at.getTime() < state.open.startedAt.getTime()) {
    return refuse("BEFORE_LAST_PUNCH", "This time lies before the start of what is running. Type a later time, or ask for a correction.", {
      field: "at", data: { since: state.open.startedAt.toISOString() },
    });
  }
  return null;
}

function begin(state: BenchState, punch: Extract<BenchPunch, { work: BenchWork }>): Result<BenchChange> {
  if (!state.isIn) return refuse("NOT_IN", "You are not clocked in at the door. Clock in, then start.", { data: { offersClockIn: true } });
  const { open } = state;
  if (open && isSameWork(open.work, punch.work)) {
    return refuse("ALREADY_RUNNING", "This is already running.", { data: { since: open.startedAt.toISOString() } });
  }
  if (open && punch.kind === "start") {
    return refuse("OTHER_RUNNING", `${labelOf(open.work)} is running. Switch, or stop it first.`, {
      data: { since: open.startedAt.toISOString(), offersSwitch: true },
    });
  }
  if (!open && punch.kind === "switch") return refuse("NOTHING_RUNNING", "Nothing is running to switch from. Start instead.");
  const barred = checkWork(punch);
  if (barred) return barred;
  const closed = open ? close(open, punch.at, false) : null;
  return ok({ closed, open: { work: punch.work, startedAt: punch.at }, flags: [...workFlags(punch), ...longFlag(closed)] });
}

function checkWork(punch: Extract<BenchPunch, { work: BenchWork }>): Refused | null {
  const { work } = punch;
  if (work.kind === "indirect") return null;
  if (work.isPieceGone) return refuse("PIECE_GONE", "This piece has left the shop. Open a claim if it came back.", { data: { offersClaim: true } });
  if (work.isDone) return refuse("OPERATION_DONE", `${work.label} is done. Ask the lead to reopen it as rework.`);
  const left = work.readyAt ? cureMinutesLeft(work.readyAt, punch.at) : 0;
  if (left > 0 && !given(punch.leadReason)) {
    return refuse("CURE_NOT_OVER", `The cure has ${left} min to go. Wait, or let a lead override it with a reason.`, {
      field: "leadReason", data: { minutesLeft: left, readyAt: work.readyAt?.toISOString() ?? null },
    });
  }
  if (work.openBefore && !given(punch.outOfOrderReason)) {
    return refuse("OUT_OF_ORDER", `${work.openBefore} comes before this and is still open. Say why you go ahead.`, { field: "outOfOrderReason" });
  }
  return null;
}

const workFlags = (punch: Extract<BenchPunch, { work: BenchWork }>): BenchFlag[] => {
  if (punch.work.kind === "indirect") return [];
  const flags: BenchFlag[] = [];
  if (punch.work.readyAt && cureMinutesLeft(punch.work.readyAt, punch.at) > 0) flags.push("cure overridden");
  if (punch.work.openBefore) flags.push("out of order");
  return flags;
};

const longFlag = (closed: ClosedBenchEntry | null): BenchFlag[] =>
  closed && closed.minutes > LONG_ENTRY_MINUTES ? ["longer than 16 h"] : [];

const close = (open: OpenBenchEntry, endedAt: Date, isOperationDone: boolean): ClosedBenchEntry => ({
  ...open, endedAt, minutes: elapsedMinutes(open.startedAt, endedAt), isOperationDone,
});

const given = (reason: string | undefined): boolean => reason !== undefined && reason.trim() !== "";
const labelOf = (work: BenchWork): string => (work.kind === "operation" ? work.label : work.work);
const isSameWork = (a: BenchWork, b: BenchWork): boolean =>
  a.kind === "operation" ? b.kind === "operation" && a.operationId === b.operationId : b.kind === "indirect" && a.work === b.work;
