import { expect, test } from "@playwright/test";
import * as counter from "./journeys/counter";
import { itIs, realTime } from "./support/clock";
import { Crew } from "./support/crew";
import { foundShopFor } from "./support/founded";

/**
 * The hero job by hand, role by role, from an empty shop to the matched bank line. Every figure that is compared stands in
 * docs/hero-job.md; the days are the ones told there.
 */
test.describe.configure({ mode: "serial" });

let crew: Crew;
let order = "";

test.beforeAll(async ({ browser }) => {
  const shop = await foundShopFor(`headworks-${Date.now().toString(36)}`);
  itIs("2026-02-17T11:20");
  crew = new Crew(browser, shop.slug);
});
test.afterAll(async () => {
  await crew.leave();
  realTime();
});

test("counter: opens the order while the customer is on the telephone", async () => {
  order = await counter.openOrder(crew);
  expect(order).toBe("WO-2026-0118");
});

test("counter: prices it from menu and shelf and sends version 1", async () => {
  itIs("2026-02-18T15:05");
  const sums = await counter.priceOrder(crew);
  expect(sums).toContain("$2,410.32");
  expect(sums).toContain("Deposit $723.10");
  for (const figure of ["18.1 h book 1,950.00", "5 % -97.50", "Parts 420.50", "Shop supplies 60.00", "Freight & insurance 42.00", "7.35 % on 480.50 35.32"]) expect(sums).toContain(figure);
  await counter.sendEstimate(crew);
});
