import "server-only";
import { commandEndpoint, defineEndpoint } from "@/modules/access/api";
import { NotFound } from "@/modules/access/context";
import { ok } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import { saveMeasurements } from "./commands/measurements";
import { postWholeTest } from "./commands/post-test";
import { recordReading } from "./commands/record-reading";
import { roomInput, sheetAskInput } from "./input";
import { headOfTag, roomPage } from "./queries/room";
import { flowSheetFor, gearOf } from "./queries/sheet";

export const recordReadingEndpoint = commandEndpoint(recordReading, {
  path: "/api/v1/s/{shop}/flow/readings", summary: "One flow reading into one cell of a test; an empty value clears it", by: ["person", "device"],
});
export const postTestEndpoint = commandEndpoint(postWholeTest, {
  path: "/api/v1/s/{shop}/flow/tests", summary: "A whole flow test of one port and side, by head id or tag", by: ["person", "device"],
});
export const flowSheetEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/flow/sheet", summary: "The flow sheet of one port pair, by head id or tag: tests and readings as typed", input: sheetAskInput, by: ["person", "device"],
  run: async (ctx, input) => {
    const headId = input.headId ?? (await headOfTag(ctx, input.tag));
    if (!headId) throw new NotFound("head");
    return ok(await flowSheetFor(ctx, headId, input.cylinder));
  },
});
export const flowRoomEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/flow/heads", summary: "Heads of the flow room and where they stand", input: roomInput, by: ["person"],
  run: async (ctx, input) => ok(await roomPage(ctx, input)),
});
export const flowGearEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/flow/gear", summary: "Benches, fixtures and operators with their ids, for a bench computer", input: z.strictObject({}), by: ["person", "device"],
  run: async (ctx) => ok(await gearOf(ctx)),
});
export const saveMeasurementsEndpoint = commandEndpoint(saveMeasurements, {
  path: "/api/v1/s/{shop}/flow/measurements", summary: "Lines of the measurement sheet of a head; each is kept or refused by itself, an empty value clears its line",
});
