import { describe, expect, it } from "vitest";
import { sources, textOf } from "./sources";

/** Routes that answer for themselves, each with the reason. */
const OWN: Record<string, string> = {
  "app/api/auth/[...nextauth]/route.ts": "next-auth's own handler",
  "app/api/health/route.ts": "says only whether the product can serve",
  "app/api/stripe/webhook/route.ts": "the provider's signature stands for origin and sign-in",
  "app/api/v1/clock/enrol/route.ts": "a tablet that is nobody yet: origin, limit of tries and the code stand for sign-in",
};
/** Makers of handlers and contexts that a route must go through. */
const THROUGH = /\b(handle\(|paperResponse\(|signedIn\(|shopFile\(|shopContextOrNull\(|shopRoute\(|openLink\(|linkContext\(|deviceContext\(|shopPage\()/;

/** What turns an error into an answer: 404, 503 with Retry-After when the database is away, 500 with a reference. */
const ANSWERS_FOR_ERRORS = /\b(handle\(|paperResponse\(|problemOf\(|plainProblemOf\()/;
/** Routes whose one call answers for its errors itself, each with the reason. */
const ANSWERED_BELOW: Record<string, string> = {
  "app/api/health/route.ts": "isHealthy never throws: an error is its answer",
  "app/api/stripe/webhook/route.ts": "receiveEvent answers 503 to every error, and the provider sends the event again",
};

const routes = sources("app", /^route\.tsx?$/);

describe("route handlers", () => {
  it("are found", () => expect(routes.length).toBeGreaterThan(3));
  it.each(routes.filter((r) => !(r in OWN)))("%s takes its caller from the access layer", (file) => {
    expect(textOf(file)).toMatch(THROUGH);
  });
  it.each(routes.filter((r) => !(r in ANSWERED_BELOW)))("%s answers for its errors the way the house does", (file) => {
    expect(textOf(file)).toMatch(ANSWERS_FOR_ERRORS);
    expect(textOf(file)).not.toMatch(/status: 500|logFault\(/);
  });
  it.each(routes)("%s stays thin", (file) => expect(textOf(file).split("\n").length).toBeLessThanOrEqual(60));
});
