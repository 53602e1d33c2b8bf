import "server-only";
import { randomUUID } from "node:crypto";
import { and, desc, eq } from "drizzle-orm";
import { customers, flowComparisons, heads, workOrders, workPieces } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf, settingsOf } from "@/modules/access/context";
import { decimal } from "@/modules/kernel/format";
import { ok, refuse } from "@/modules/kernel/result";
import { scaleLiftText } from "../domain/curve-scale";
import { notTestedWords, reportSide, type ReportSide, type ReportSnapshot } from "../domain/report-snapshot";
import { ratiosOfPort } from "../domain/port-ratios";
import { replacedWhy } from "../domain/report-replaces";
import { sideGain } from "../domain/side-gain";
import { camIdOf, standingTests } from "../domain/standing-tests";
import { issueInput } from "../input";
import { camsOf } from "../queries/cams-of-tests";
import { withRepeatHistory } from "../queries/repeat-history";
import { rawTests } from "../queries/tests-of-head";

/** What a report says of the cam; null on papers issued before it was on them. */
const cammed = (sides: readonly Pick<ReportSide, "means">[]): string | null => (sides.some((s) => s.means) ? sides.map(({ means }) => (typeof means?.overCam === "object" ? [means.overCam.camLabel, means.overCam.spanDeg, means.overCam.beforeCfm, means.overCam.afterCfm].join() : (means?.overCam ?? ""))).join(";") : null);
/** Every verdict of a report, to tell whether another one would say something else. */
const verdictsOf = (sides: readonly Pick<ReportSide, "gain">[]): string => sides.map(({ gain }) => (gain.comparable ? (gain.noise?.rows ?? []).map((r) => r.words).join() : "")).join(";");

/**
 * Freezes what is known of one port pair, with its conditions, as the next version of the head's flow report. Two sets that
 * cannot be compared are issued as two tables with the reasons.
 */
export const issueComparison = defineCommand({
  name: "flow.issue-comparison",
  act: "flow.issue",
  input: issueInput,
  async run(ctx, { headId, cylinder, customerWords }) {
    const { tx, shop } = ctx;
    const issuedBy = personIdOf(ctx);
    if (!issuedBy) return refuse("PERSON_REQUIRED", "A report is issued by a person.");
    const [row] = await tx.select({ h: heads, orderNumber: workOrders.number, customerName: customers.name }).from(heads)
      .leftJoin(workPieces, and(eq(workPieces.shopId, heads.shopId), eq(workPieces.id, heads.pieceId)))
      .leftJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
      .leftJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
      .where(and(eq(heads.shopId, shop.id), eq(heads.id, headId))).for("update", { of: heads });
    if (!row || cylinder > row.h.cylinders) return refuse("NOT_FOUND", "This head is not here.");
    const settings = await settingsOf(ctx);
    const tests = await withRepeatHistory(ctx, (await rawTests(ctx, { headIds: [headId] })).filter((t) => t.cylinder === cylinder));
    const sides: { side: "intake" | "exhaust"; standing: ReturnType<typeof standingTests>; gain: ReportSnapshot["sides"][number]["gain"] }[] = [];
    for (const side of ["intake", "exhaust"] as const) {
      const standing = standingTests(tests, side, "complete");
      const gain = sideGain(standing, side, settings.benchCheckHours);
      if (!gain.ok) return gain;
      sides.push({ side, standing, gain: gain.value });
    }
    const idsOf = (when: "before" | "after") => sides.flatMap((s) => s.standing[when]?.id ?? []);
    const beforeTestIds = idsOf("before");
    const afterTestIds = idsOf("after");
    if (beforeTestIds.length + afterTestIds.length === 0) return refuse("NOTHING_FINISHED", "No test of this port is finished yet. Finish one first.");
    const cams = await camsOf(ctx, tests);
    const told = sides.map((s) => reportSide(s, cams.get(camIdOf(s.standing) ?? "") ?? null));
    const [last] = await tx.select().from(flowComparisons).where(and(eq(flowComparisons.shopId, shop.id), eq(flowComparisons.headId, headId), eq(flowComparisons.cylinder, cylinder)))
      .orderBy(desc(flowComparisons.comparisonNo)).limit(1);
    const lastSides = (last?.snapshot as ReportSnapshot | undefined)?.sides ?? [];
    const isSameOfCam = cammed(lastSides) === null || cammed(lastSides) === cammed(told);
    if (last && last.customerWords === customerWords && String(last.beforeTestIds) === String(beforeTestIds) && String(last.afterTestIds) === String(afterTestIds) && verdictsOf(lastSides) === verdictsOf(sides) && isSameOfCam) {
      return refuse("NOTHING_CHANGED", `Report ${last.comparisonNo} already says exactly this.`);
    }
    const comparisonNo = (last?.comparisonNo ?? 0) + 1;
    const unit = tests.at(-1)?.liftUnit ?? "in";
    const liftWords = (um: number) => scaleLiftText(um, unit, (v, d) => decimal(v, d, shop.locale));
    const snapshot: ReportSnapshot = {
      kind: 4, shop: { name: shop.name, address: settings.address, phone: settings.phone, email: settings.email }, locale: shop.locale, zone: shop.zone,
      head: { mark: row.h.mark, family: row.h.family, castingNumber: row.h.castingNumber, orderNumber: row.orderNumber, customerName: row.customerName },
      cylinder, cylinders: row.h.cylinders, comparisonNo,
      sides: told, ratios: ratiosOfPort(standingTests(tests, "intake", "complete"), standingTests(tests, "exhaust", "complete")),
      ...(last ? { replaces: { comparisonNo: last.comparisonNo, issuedAt: last.issuedAt.toISOString(), why: replacedWhy(sides.flatMap((s) => [s.standing.before, s.standing.after].filter((t) => t !== null)), { testIds: [...last.beforeTestIds, ...last.afterTestIds], isReworded: last.customerWords !== customerWords }) } } : {}),
      notTested: notTestedWords(sides, cylinder, row.h.cylinders, liftWords), customerWords, issuedBy: ctx.actor.name, issuedAt: ctx.now.toISOString(),
    };
    const id = randomUUID();
    await tx.insert(flowComparisons).values({ shopId: shop.id, id, headId, cylinder, comparisonNo, beforeTestIds, afterTestIds, snapshot, customerWords, issuedAt: ctx.now, issuedBy });
    return ok({ comparisonId: id, comparisonNo });
  },
  subject: (_, value) => ({ kind: "flow-comparison", id: value.comparisonId }),
});
