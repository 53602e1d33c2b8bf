import { hours } from "@/modules/kernel/format";
import type { BoardJob, BoardPerson, ClockBoard } from "../board";

/** `1 h 43`, `12 min`. */
export const spell = (minutes: number): string => (minutes >= 60 ? `${Math.floor(minutes / 60)} h ${String(minutes % 60).padStart(2, "0")}` : `${minutes} min`);

/** `Clean-up`. */
export const capital = (words: string): string => `${words.slice(0, 1).toUpperCase()}${words.slice(1)}`;

/** What a person is on, for their tile. */
export function doing(board: ClockBoard, p: BoardPerson): string {
  if (p.running) {
    const job = board.jobs.find((j) => j.operationId === p.running?.operationId);
    return job ? `${job.tag} ${job.operation}` : capital(p.running.indirect ?? "On an operation");
  }
  return p.door === "in" ? "In, nothing running" : p.door === "at meal" ? "At a meal" : "Off the clock";
}

/** `Drury Vale, 8.0 h book`, or why it waits. */
export const about = (job: BoardJob, locale: string): string => `${job.customer}, ${job.waits ?? (job.openBefore ? `${job.openBefore.toLowerCase()} is open` : `${hours(job.bookMinutes, locale)} h book`)}`;
