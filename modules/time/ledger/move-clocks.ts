import "server-only";
import type { TxContext } from "@/modules/access/context";
import { ok, type Result } from "@/modules/kernel/result";
import { punchBench, type BenchPunch } from "../domain/bench-clock";
import { punchDoor, type DoorPunchKind } from "../domain/door-clock";
import type { Acting } from "../identity/acting";
import type { ClockState } from "./clock-state";
import { endEntry, writeEntry, writePunch, type EntryFacts } from "./write";

/** Moves the door clock. Going out or to a meal stops the bench clock in the same second. Answers flags. */
export async function moveDoor(ctx: TxContext, acting: Acting, state: ClockState, kind: DoorPunchKind, note = ""): Promise<Result<readonly string[]>> {
  const moved = punchDoor(state.door, { kind, at: acting.at }, ctx.now);
  if (!moved.ok) return moved;
  const flags: string[] = [...moved.value.flags];
  if (moved.value.state === "in") {
    await writeEntry(ctx, { personId: acting.person.id, clock: "door", startedAt: acting.at, source: acting.source });
  } else {
    if (state.bench) {
      const stopped = await moveBench(ctx, acting, state, { kind: "stop", at: acting.at }, {});
      if (!stopped.ok) return stopped;
      flags.push(...stopped.value);
    }
    if (state.door.entryId) await endEntry(ctx, state.door.entryId, acting.at);
  }
  await writePunch(ctx, acting, { kind, flags, note });
  return ok(flags);
}

/** Moves the bench clock: closes what runs, opens what was chosen, in the same second. `operation` belongs to the work chosen. */
export async function moveBench(
  ctx: TxContext, acting: Acting, state: ClockState, punch: BenchPunch, more: { operation?: EntryFacts["operation"]; note?: string },
): Promise<Result<readonly string[]>> {
  const moved = punchBench({ isIn: state.door.state === "in", open: state.bench }, punch, ctx.now);
  if (!moved.ok) return moved;
  const { open, flags } = moved.value;
  if (state.bench && moved.value.closed) await endEntry(ctx, state.bench.entryId, acting.at);
  const before = state.bench?.work;
  const work = open?.work ?? before;
  if (open) {
    await writeEntry(ctx, {
      personId: acting.person.id, clock: "bench", startedAt: acting.at, source: acting.source, operation: open.work.kind === "operation" ? (more.operation ?? null) : null,
      indirectCode: open.work.kind === "indirect" ? open.work.work : null, reason: more.note ?? "",
    });
  }
  await writePunch(ctx, acting, {
    kind: punch.kind, flags, note: more.note ?? "",
    operationId: work?.kind === "operation" ? work.operationId : null, indirectCode: work?.kind === "indirect" ? work.work : null,
  });
  return ok(flags);
}
