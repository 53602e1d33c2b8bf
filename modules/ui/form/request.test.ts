import { createElement } from "react";
import { renderToStaticMarkup } from "react-dom/server";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { AWAY_WORDS, TRY_AGAIN } from "@/modules/kernel/away";
import { noLink, readReply } from "./form-trouble";
import { FormTrouble } from "./form-trouble-note";
import { NoAnswer, RequestId, RequestIds, within } from "./request-id";

describe("request id", () => {
  const counter = () => {
    let n = 0;
    return new RequestId(() => `id-${++n}`);
  };
  it("stays until something settles it", () => {
    const r = counter();
    expect([r.take(), r.take()]).toEqual(["id-1", "id-1"]);
    r.settle();
    expect(r.take()).toBe("id-2");
  });
  it("stays for each thing a screen can do, and settles one without the others", () => {
    let n = 0;
    const ids = new RequestIds(() => `id-${++n}`);
    expect([ids.take("issue"), ids.take("finish"), ids.take("issue")]).toEqual(["id-1", "id-2", "id-1"]);
    ids.settle("issue");
    expect([ids.take("issue"), ids.take("finish")]).toEqual(["id-3", "id-2"]);
  });
  it("is kept whenever the shop may or may not have done it", () => {
    expect(noLink.keepId).toBe(true);
    expect(readReply({ status: "error", reference: "A7" }).keepId).toBe(true);
    expect(readReply({ status: "signed-out" }).keepId).toBe(true);
  });
  it("is kept while the shop's data is away, and the form says so with its one way on", () => {
    const away = readReply({ status: "refused", code: TRY_AGAIN, message: AWAY_WORDS.unknown });
    expect(away).toEqual({ trouble: { kind: "away", message: AWAY_WORDS.unknown }, fields: [], keepId: true });
    const shown = renderToStaticMarkup(createElement(FormTrouble, { trouble: away.trouble, onRetry: () => undefined, pending: false, signInHref: "/sign-in" }));
    expect(shown).toContain("the same request is not carried out twice");
    expect(shown).toContain("What you typed is kept");
    expect(shown).toContain("<span>Try again</span>");
  });
  it("is new after an answer that settles it", () => {
    expect(readReply({ status: "refused", code: "x", message: "No." }).keepId).toBe(false);
    expect(readReply({ status: "invalid", fields: [] }).keepId).toBe(false);
    expect(readReply({ status: "conflict", message: "Changed." }).keepId).toBe(false);
  });
});

describe("where an answer is shown", () => {
  it("a refusal of one field stands under it", () => {
    expect(readReply({ status: "refused", code: "x", message: "Too much.", field: "lines.2.qty" })).toEqual({
      trouble: null,
      fields: [{ path: "lines.2.qty", message: "Too much." }],
      keepId: false,
    });
  });
  it("a refusal of the whole stands above the form, with its code and data", () => {
    expect(readReply({ status: "refused", code: "short", message: "4 short.", data: { short: 4 } }).trouble).toEqual({
      kind: "refused",
      code: "short",
      message: "4 short.",
      data: { short: 4 },
    });
  });
  it("bad input stands under every field named", () => {
    const fields = [{ path: "phone", message: "One digit short." }, { path: "promised", message: "Closed." }];
    expect(readReply({ status: "invalid", fields })).toMatchObject({ trouble: null, fields });
  });
});

describe("waiting for an answer", () => {
  beforeEach(() => vi.useFakeTimers());
  afterEach(() => vi.useRealTimers());
  it("passes the answer and the failure on", async () => {
    await expect(within(1000, Promise.resolve(7))).resolves.toBe(7);
    await expect(within(1000, Promise.reject(new TypeError("Failed to fetch")))).rejects.toBeInstanceOf(TypeError);
    expect(vi.getTimerCount()).toBe(0);
  });
  it("gives up in time", async () => {
    const waiting = expect(within(1000, new Promise(() => undefined))).rejects.toBeInstanceOf(NoAnswer);
    await vi.advanceTimersByTimeAsync(1000);
    await waiting;
  });
});
