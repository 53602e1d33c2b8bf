import "server-only";
import { defineCommand } from "@/modules/access/command";
import { ok, refuse } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import { typedInstant } from "../domain/typed-time";
import { stampInput } from "../identity/acting";
import { moveDoor } from "../ledger/move-clocks";
import { press, type Pressed } from "../ledger/press";

const input = z.strictObject({
  ...stampInput,
  /** Wall clock of the shop, `YYYY-MM-DDTHH:mm`. */
  leftAt: z.string().max(20),
  which: z.enum(["first", "second"]).optional(),
});

/** "When did you leave on Tuesday?" Ends what was left open at the time typed; it stays flagged until somebody looks. */
export const sayWhenLeft = defineCommand({
  name: "time.sayWhenLeft", act: "clock.punch", input, secret: ["proof"],
  run: (ctx, { leftAt, which, ...stamp }) => press(ctx, stamp, { kind: "out", note: `said: left ${leftAt}` }, async (inner, acting, state) => {
    const left = typedInstant(leftAt, inner.shop.zone, which);
    if (!left.ok) return left;
    if (state.door.state !== "in" || !state.door.since) return refuse("ALREADY_OUT", "Your attendance is closed already.");
    if (left.value < state.door.since) return refuse("OUT_BEFORE_IN", "This lies before you came in. Type a later time.", { field: "leftAt" });
    if (left.value >= inner.now) return refuse("FUTURE_TIME", "This time has not come yet. Type the time you left that day.", { field: "leftAt" });
    // Bench work that was begun after the time typed is worth nothing without an attendance; it ends where it began.
    const then = state.bench && state.bench.startedAt > left.value ? state.bench.startedAt : left.value;
    const moved = await moveDoor(inner, { ...acting, at: then, flags: [...acting.flags, "out typed later"] }, state, "out", "typed when asked");
    return moved.ok ? ok([...moved.value, "out typed later"]) : moved;
  }),
  subject: (_, value: Pressed) => ({ kind: "person", id: value.personId }),
});
