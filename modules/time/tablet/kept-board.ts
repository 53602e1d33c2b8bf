import type { BoardJob, BoardPerson, ClockBoard } from "../board";
import { elapsedMinutes } from "../domain/elapsed";

export type TabletPress = "doorIn" | "doorOut" | "mealOut" | "mealIn" | "startOperation" | "switchTo" | "stopClock" | "operationDone" | "startIndirect" | "sayWhenLeft";

export interface KeptPress {
  readonly press: TabletPress;
  readonly personId: string;
  /** Instant, ISO. */
  readonly at: string;
  readonly operationId?: string;
  readonly work?: string;
}

/**
 * The board as it will be once a press has arrived, so that a tablet without a link goes on showing the truth as far as it
 * knows it. The server's board replaces it when the link is back. A press for a person who is not on the board changes nothing.
 */
export function boardAfter(board: ClockBoard, p: KeptPress): ClockBoard {
  const person = board.people.find((x) => x.id === p.personId);
  if (!person) return board;
  const { jobs, closed } = closeRunning(board.jobs, person, p.at);
  const withPerson = (next: BoardPerson, nextJobs: readonly BoardJob[] = jobs): ClockBoard => ({ ...board, jobs: nextJobs, people: board.people.map((x) => (x.id === next.id ? next : x)) });
  const isIn: BoardPerson = person.door === "in" ? person : { ...person, door: "in", doorSince: p.at };
  switch (p.press) {
    case "doorIn":
    case "mealIn":
      return withPerson(isIn, board.jobs);
    case "doorOut":
    case "mealOut":
    case "sayWhenLeft":
      return withPerson({
        ...closed, door: p.press === "mealOut" ? "at meal" : "out", doorSince: p.at,
        todayMinutes: person.todayMinutes + (p.press !== "sayWhenLeft" && person.door === "in" && person.doorSince ? Math.max(0, elapsedMinutes(new Date(person.doorSince), new Date(p.at))) : 0),
      });
    case "startOperation":
    case "switchTo":
      return withPerson({ ...isIn, running: { operationId: p.operationId ?? null, indirect: null, since: p.at } });
    case "startIndirect":
      return withPerson({ ...isIn, running: { operationId: null, indirect: p.work ?? null, since: p.at } });
    case "stopClock":
      return withPerson(closed);
    case "operationDone":
      return withPerson(closed, jobs.filter((j) => j.operationId !== (p.operationId ?? person.running?.operationId)));
  }
}

function closeRunning(jobs: readonly BoardJob[], person: BoardPerson, at: string): { jobs: readonly BoardJob[]; closed: BoardPerson } {
  const { running } = person;
  if (!running) return { jobs, closed: person };
  const minutes = Math.max(0, elapsedMinutes(new Date(running.since), new Date(at)));
  return { jobs: jobs.map((j) => (j.operationId === running.operationId ? { ...j, doneMinutes: j.doneMinutes + minutes } : j)), closed: { ...person, running: null } };
}

/** Open operations in the order a person is likely to take them: the head they are on, then their skills, then as promised. */
export function jobsFor(board: ClockBoard, person: BoardPerson): BoardJob[] {
  const tag = board.jobs.find((j) => j.operationId === person.running?.operationId)?.tag;
  const rank = (j: BoardJob) => (person.skills.length > 0 && !person.skills.includes(j.skill) ? 4 : 0) + (j.tag === tag ? 0 : 1) + (j.openBefore ? 1 : 0);
  return board.jobs.filter((j) => j.operationId !== person.running?.operationId).map((j, i) => ({ j, i, r: rank(j) })).sort((a, b) => a.r - b.r || a.i - b.i).map((x) => x.j);
}
