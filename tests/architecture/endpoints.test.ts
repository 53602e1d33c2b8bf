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

const routes = sources("app", /^route\.tsx?$/);

describe("route handlers", () => {
  it("are found", () => expect(routes.length).toBeGreaterThan(3));
  it.each(routes.filter((r) => !(r in OWN)))("%s takes its caller from the access layer", (file) => {
    expect(textOf(file)).toMatch(THROUGH);
  });
  it.each(routes)("%s stays thin", (file) => expect(textOf(file).split("\n").length).toBeLessThanOrEqual(60));
});
