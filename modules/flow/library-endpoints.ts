import "server-only";
import { defineEndpoint } from "@/modules/access/api";
import { ok } from "@/modules/kernel/result";
import { familyPictureInput, libraryInput, overlayInput } from "./library-input";
import { libraryTests } from "./queries/library";
import { familyPicture, overlayOf } from "./queries/library-family";

export const libraryEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/flow/library", summary: "Every finished test of every head, newest first", input: libraryInput, by: ["person"],
  run: async (ctx, input) => ok(await libraryTests(ctx, input)),
});
export const familyPictureEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/flow/library/family", summary: "What an engine family did: middle and best curve, gains of its last heads at each lift", input: familyPictureInput, by: ["person"],
  run: async (ctx, input) => ok(await familyPicture(ctx, input)),
});
export const overlayEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/flow/library/overlay", summary: "Two tests over each other, and whether they may be compared", input: overlayInput, by: ["person"],
  run: async (ctx, input) => ok(await overlayOf(ctx, input)),
});
