import "server-only";
import { defineCommand } from "@/modules/access/command";
import { z } from "@/modules/kernel/zod";
import { INDIRECT_WORK } from "../domain/indirect-work";
import { stampInput } from "../identity/acting";
import { clockState } from "../ledger/clock-state";
import { moveBench, moveDoor } from "../ledger/move-clocks";
import { press, type Pressed } from "../ledger/press";

const indirectInput = z.strictObject({
  ...stampInput,
  work: z.enum(INDIRECT_WORK, { error: "Choose what it is: clean-up, waiting for parts, break and so on." }),
  note: z.string().trim().max(300, "At most 300 characters.").default(""),
  /** Clocks in at the door first, in the same second. */
  doorIn: z.boolean().default(false),
});

/** Time that belongs to no operation. Switches away from whatever runs. */
export const startIndirect = defineCommand({
  name: "time.startIndirect", act: "clock.punch", input: indirectInput, secret: ["proof"],
  run: (ctx, input) => press(ctx, input, { kind: "start", indirectCode: input.work, note: input.note }, async (inner, acting, before) => {
    let state = before;
    if (input.doorIn && state.door.state !== "in") {
      const came = await moveDoor(inner, acting, state, "in");
      if (!came.ok) return came;
      state = await clockState(inner, acting.person.id);
    }
    return moveBench(inner, acting, state, { kind: state.bench ? "switch" : "start", at: acting.at, work: { kind: "indirect", work: input.work } }, { note: input.note });
  }),
  subject: (_, value: Pressed) => ({ kind: "person", id: value.personId }),
});

const stopClockInput = z.strictObject({ ...stampInput });
/** Ends what runs on the bench clock; the operation stays open. */
export const stopClock = defineCommand({
  name: "time.stopClock", act: "clock.punch", input: stopClockInput, secret: ["proof"],
  run: (ctx, input) => press(ctx, input, { kind: "stop" }, (inner, acting, state) => moveBench(inner, acting, state, { kind: "stop", at: acting.at }, {})),
  subject: (_, value: Pressed) => ({ kind: "person", id: value.personId }),
});
