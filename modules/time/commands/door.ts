import "server-only";
import { defineCommand } from "@/modules/access/command";
import { z } from "@/modules/kernel/zod";
import type { DoorPunchKind } from "../domain/door-clock";
import { stampInput } from "../identity/acting";
import { moveDoor } from "../ledger/move-clocks";
import { press, type Pressed } from "../ledger/press";

const doorInput = z.strictObject({ ...stampInput, note: z.string().trim().max(300, "At most 300 characters.").default("") });

const doorCommand = (name: string, kind: DoorPunchKind) =>
  defineCommand({
    name, act: "clock.punch", input: doorInput, secret: ["proof"],
    run: (ctx, input) => press(ctx, input, { kind, note: input.note }, (inner, acting, state) => moveDoor(inner, acting, state, kind, input.note)),
    subject: (_, value: Pressed) => ({ kind: "person", id: value.personId }),
  });

/** Attendance. Early, late and incomplete punches are never refused; what is missing before them is flagged and asked about. */
export const doorIn = doorCommand("time.doorIn", "in");
export const doorOut = doorCommand("time.doorOut", "out");
export const mealOut = doorCommand("time.mealOut", "meal out");
export const mealIn = doorCommand("time.mealIn", "meal in");
