import { clockTime } from "@/modules/kernel/format";
import { Icon } from "@/modules/ui/icon";
import type { QueueState } from "./reading-queue";

/** `Saved 09:41:07`, or what waits and why. Said aloud when the link goes and when it is back. */
export function SaveState({ state, savedAt, place }: { state: QueueState; savedAt: Date | null; place: { locale: string; zone: string } }) {
  const { waiting, link } = state;
  const held = [...state.cells.values()].filter((c) => c.stuck).length;
  const words = waiting > 0 && link === "signed-out" ? `${waiting} waiting. Sign in again to save ${waiting === 1 ? "it" : "them"}.`
    : waiting > 0 && link === "down" ? `${waiting} waiting, no link. Kept on this tablet.`
    : waiting > 0 ? "Saving…"
    : savedAt ? `Saved ${clockTime(savedAt, place)}` : "Saved as typed";
  return (
    <span className="saved" role="status">
      <Icon name={waiting > 0 && link !== "up" ? "unplug" : "check"} size={15} />
      {words}{held > 0 ? `${words.endsWith(".") ? "" : "."} ${held} for you to look at.` : ""}
    </span>
  );
}
