import "server-only";
import { defineEndpoint } from "@/modules/access/api";
import { ok, type Result } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import { doorIn, doorOut, mealIn, mealOut } from "@/modules/time/commands/door";
import { startIndirect, stopClock } from "@/modules/time/commands/indirect";
import { sayWhenLeft } from "@/modules/time/commands/missing-out";
import { identify, identifyInput } from "@/modules/time/identity/identify";
import type { Pressed } from "@/modules/time/ledger/press";
import { operationDone, startOperation, switchTo } from "./commands/bench-clock";
import { clockBoard } from "./queries/bench-list";

export const clockBoardEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/clock/board", summary: "People and open work, for a tablet's screens", input: z.object({}), by: ["device"],
  run: async (ctx) => ok(await clockBoard(ctx)),
});

export const identifyEndpoint = defineEndpoint({
  method: "POST", path: "/api/v1/clock/identify", summary: "Badge or PIN at a tablet, for a pass of three minutes", input: identifyInput, by: ["device"],
  run: (ctx, input) => identify(ctx, input),
});

const PRESSES = { doorIn, doorOut, mealOut, mealIn, startOperation, switchTo, stopClock, operationDone, startIndirect, sayWhenLeft } as const;
export const PRESS_NAMES = ["doorIn", "doorOut", "mealOut", "mealIn", "startOperation", "switchTo", "stopClock", "operationDone", "startIndirect", "sayWhenLeft"] as const satisfies readonly (keyof typeof PRESSES)[];

/** One address for everything pressed at a tablet, so that what was kept there can be sent in its order. The command checks its own input. */
export const pressEndpoint = defineEndpoint({
  method: "POST", path: "/api/v1/clock/punches", summary: "One press at a tablet, live or kept", by: ["device"], revokedToo: true,
  input: z.strictObject({ press: z.enum(PRESS_NAMES), input: z.record(z.string(), z.unknown()) }),
  run: async (ctx, { press, input }, requestId): Promise<Result<Pressed>> => {
    const command = PRESSES[press] as (c: typeof ctx, raw: unknown, o: { requestId?: string }) => Promise<Result<Pressed>>;
    return command(ctx, input, requestId ? { requestId } : {});
  },
});
