import { time } from "@/modules/kernel/format";
import { Icon } from "@/modules/ui/icon";
import type { LineQueueState } from "./measure-queue";

const lines = (n: number): string => `${n} ${n === 1 ? "line" : "lines"}`;

/** `Saved 10:02`, or what is kept on this device and why. Said aloud when the link goes and when it is back. */
export function MeasureSaveState({ state, savedAt, place }: { state: LineQueueState; savedAt: Date | null; place: { locale: string; zone: string } }) {
  const { waiting, link, others } = state;
  const held = [...state.lines.values()].filter((l) => l.stuck !== null).length;
  const saved = savedAt ? `Saved ${time(savedAt, place)}` : "Saved as typed";
  const words = waiting > 0 && link === "signed-out" ? `${waiting} kept on this device. Sign in again to save ${waiting === 1 ? "it" : "them"}.`
    : waiting > 0 && link === "down" ? `${savedAt ? `${saved}, ` : ""}${waiting} kept on this device, no link. ${waiting === 1 ? "It goes" : "They go"} as soon as it is back.`
    : waiting > 0 ? `${waiting} kept on this device, saving…`
    : saved;
  return (
    <span className="dim sm inline-flex items-center gap-1.5" role="status">
      <Icon name={waiting > 0 && link !== "up" ? "unplug" : "check"} size={15} />
      {words}{held > 0 ? `, ${held} for you to look at` : ""}{others > 0 ? `, ${lines(others)} of somebody else until they sign in` : ""}
    </span>
  );
}
