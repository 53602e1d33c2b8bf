/** One client: acts, and keeps at an act under the same key until something definite comes back. */
import { nextAct } from "./acts.mjs";

const sleep = (ms) => new Promise((resolve) => setTimeout(resolve, ms));
/** No answer later than this counts as one. */
const PATIENCE_MS = 10_000;
const GIVE_UP_MS = 120_000;

async function send(appUrl, act, who, cutAfterMs) {
  const started = Date.now();
  const cut = new AbortController();
  const timer = setTimeout(() => cut.abort(), cutAfterMs ?? PATIENCE_MS);
  try {
    const answer = await fetch(`${appUrl}${act.path}`, {
      method: "POST", body: JSON.stringify(act.body), signal: cut.signal, redirect: "manual",
      headers: { "content-type": "application/json", "idempotency-key": act.key, origin: appUrl, ...who },
    });
    const text = await answer.text();
    let reply = null;
    try {
      reply = JSON.parse(text);
    } catch {
      // Half an answer is none.
      return { status: 0, why: "answer cut", ms: Date.now() - started };
    }
    return { status: answer.status, reply, ms: Date.now() - started, retryAfter: answer.headers.get("retry-after") };
  } catch (error) {
    return { status: 0, why: error.cause?.code ?? error.name, ms: Date.now() - started };
  } finally {
    clearTimeout(timer);
  }
}

const isDefinite = (outcome) => outcome.status >= 200 && outcome.status < 500 && ![401, 408, 429].includes(outcome.status);

/**
 * @param o `{ appUrl, shop, n, chance, journal, budget, watch, foreignCustomer, as, passOf, lineOf, operation }`: `as(by)` gives headers, `passOf()` a pass at
 *   the tablet; `budget.left` acts still to do by all; `watch` hears of every outcome
 */
export async function runClient(o) {
  const client = {
    ...o, known: { customers: [], orders: [o.shop.orders[o.n]], needs: [], drafts: [], sent: [], revisions: {}, clock: { door: "out", bench: null }, operation: o.operation },
  };
  while (o.budget.left > 0) {
    o.budget.left -= 1;
    const act = nextAct(client);
    // A pass is part of what is sent, so it is fetched once and kept for every repeat.
    if (act.by === "tablet") act.body.input.proof = await o.passOf();
    o.journal.intend(act);
    const began = Date.now();
    // Now and then the line is cut while the answer is on its way, or the same press is sent twice at once.
    const cut = o.chance.next() < 0.04 ? o.chance.below(25) : undefined;
    const twice = cut === undefined && o.chance.next() < 0.04;
    let definite = null;
    for (let tries = 0; definite === null; tries++) {
      const outcomes = tries === 0 && twice
        ? await Promise.all([send(o.appUrl, act, await o.as(act.by), undefined), send(o.appUrl, act, await o.as(act.by), undefined)])
        : [await send(o.appUrl, act, await o.as(act.by), tries === 0 ? cut : undefined)];
      for (const outcome of outcomes) {
        o.journal.answered(act.key, outcome);
        o.watch(outcome);
        if (isDefinite(outcome) && (definite === null || outcome.status < 300)) definite = outcome;
      }
      if (definite === null) {
        if (Date.now() - began > GIVE_UP_MS) break;
        await sleep(60 + o.chance.below(250));
      }
    }
    if (definite && definite.status < 300) await act.learn(definite.reply);
  }
}
