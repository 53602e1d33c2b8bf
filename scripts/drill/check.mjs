/** Decides what a drill has shown: the journal of what was acknowledged against the database as it is. */
import fs from "node:fs";
import path from "node:path";
import { createHash } from "node:crypto";
import { isDeepStrictEqual } from "node:util";
import { MUST_FAIL } from "./acts.mjs";
import { readJournal, verdictOf } from "./journal.mjs";

/** How often the effect of an act stands in the database, by the act's own key. */
const EFFECT = {
  "customers.add": "select substring(email from '^c-([0-9a-f-]{36})@') as key from customers where email like 'c-%@drill.example'",
  "orders.open": "select wants as key from work_orders where wants ~ '^[0-9a-f-]{36}$'",
  "stock.opening": "select reason as key from stock_movements where kind = 'opening' and reason ~ '^[0-9a-f-]{36}$'",
  "stock.count": "select substring(reason from '[0-9a-f-]{36}$') as key from stock_movements where kind = 'count difference'",
  "purchasing.draft": "select notes as key from purchase_orders where notes ~ '^[0-9a-f-]{36}$'",
  "purchasing.receive": "select delivery_note as key from receipts where delivery_note ~ '^[0-9a-f-]{36}$'",
  "payments.take": "select note as key from payments where note ~ '^[0-9a-f-]{36}$'",
  "time.startIndirect": "select note as key from punches where note ~ '^[0-9a-f-]{36}$' and kind in ('start', 'switch')",
  "time.doorIn": "select note as key from punches where note ~ '^[0-9a-f-]{36}$' and kind = 'in'",
  "time.doorOut": "select note as key from punches where note ~ '^[0-9a-f-]{36}$' and kind = 'out'",
  "time.mealOut": "select note as key from punches where note ~ '^[0-9a-f-]{36}$' and kind = 'meal out'",
  "time.mealIn": "select note as key from punches where note ~ '^[0-9a-f-]{36}$' and kind = 'meal in'",
};

const countBy = (rows) => {
  const n = new Map();
  for (const { key } of rows) n.set(key, (n.get(key) ?? 0) + 1);
  return n;
};
const total = (list, of) => list.reduce((sum, x) => sum + of(x), 0);
const minorOf = (text) => Math.round(Number(text) * 100);

/** Sums that must come out the same from the journal and from the ledgers. Only acts of the drill, not of its preparation. */
async function totalsDiffer(acts, ask) {
  const done = (command) => acts.filter((a) => a.command === command && a.verdict === "acknowledged");
  const one = async (text) => Number((await ask(text))[0].n);
  const rows = [
    ["sum of payments", total(done("payments.take"), (a) => minorOf(a.body.amount)), await one("select coalesce(sum(amount_minor), 0) as n from payments")],
    ["value of opening stock", total(done("stock.opening"), (a) => minorOf(a.body.value)), await one("select coalesce(sum(value_minor), 0) as n from stock_movements where kind = 'opening' and reason <> ''")],
    ["parts issued, thousandths", total(done("workOrders.issuePart"), (a) => Number(a.body.qty) * 1000), await one("select coalesce(-sum(qty_milli), 0) as n from stock_movements where kind = 'issue'")],
    ["parts needed, thousandths", total(done("workOrders.needPart"), (a) => Number(a.body.qty) * 1000), await one("select coalesce(sum(needed_milli), 0) as n from work_order_parts where estimate_line_id is null")],
    ["parts taken in, thousandths", total(done("purchasing.receive"), (a) => Number(a.body.lines[0].came) * 1000), await one("select coalesce(sum(qty_milli), 0) as n from stock_movements where kind = 'receipt'")],
    ["readings", done("flow.record-reading").length, await one("select count(*) as n from flow_readings")],
    ["presses at the clock", acts.filter((a) => a.kind.startsWith("press") && a.verdict === "acknowledged").length, await one("select count(*) as n from command_log where command like 'time.%' or command like 'workOrders.%' and command ~ 'startOperation|switchTo|operationDone'")],
    ["edits of customers", done("customers.change").length, await one("select coalesce(sum(version - 1), 0) as n from customers")],
  ];
  // What never got an answer may be in or out: then sums say nothing.
  const unsure = new Set(acts.filter((a) => a.verdict === "unknown").map((a) => a.command));
  return unsure.size > 0 ? [] : rows.filter(([, sent, there]) => sent !== there).map(([what, sent, there]) => ({ what, sent, there }));
}

/** Each kept file against its bytes. */
async function filesBroken(ask, folder) {
  const rows = await ask("select id, storage_key, sha256, size_bytes from files");
  return rows.filter((f) => {
    const file = path.join(folder, f.storage_key);
    if (!fs.existsSync(file)) return true;
    const bytes = fs.readFileSync(file);
    return bytes.length !== f.size_bytes || createHash("sha256").update(bytes).digest("hex") !== f.sha256;
  });
}

/**
 * @param o `{ journal, ask, breaches, chainFault, chainRows, filesFolder, mails }`
 * @returns figures, and `faults`: what was lost, doubled or broken, each with its words
 */
export async function check(o) {
  const acts = readJournal(o.journal).map((a) => ({ ...a, ...verdictOf(a) }));
  const log = new Map();
  for (const row of await o.ask("select request_id, command, reply from command_log where request_id is not null")) log.set(row.request_id, [...(log.get(row.request_id) ?? []), row]);
  const trail = countBy(await o.ask("select request_id as key from audit_log where request_id is not null"));
  const effects = Object.fromEntries(await Promise.all(Object.entries(EFFECT).map(async ([command, text]) => [command, countBy(await o.ask(text))])));
  const lost = [], doubled = [], differing = [];
  for (const act of acts) {
    const kept = log.get(act.key) ?? [];
    const counts = [["answers kept", kept.length], ["rows in the trail", trail.get(act.key) ?? 0], ...(effects[act.command] && !MUST_FAIL.includes(act.kind) ? [["effects", effects[act.command].get(act.key) ?? 0]] : [])];
    const least = act.verdict === "acknowledged" ? 1 : 0;
    const most = act.verdict === "refused" ? 0 : 1;
    for (const [what, n] of counts) {
      if (n < least) lost.push({ key: act.key, command: act.command, what, n });
      if (n > most) doubled.push({ key: act.key, command: act.command, verdict: act.verdict, what, n });
    }
    if (act.verdict === "acknowledged") {
      const replies = [...act.replies, ...kept.map((k) => k.reply)];
      if (replies.some((r) => !isDeepStrictEqual(r, replies[0]))) differing.push({ key: act.key, command: act.command, replies });
      if (act.command === "customers.change" && act.reply.version !== act.body.version + 1) differing.push({ key: act.key, command: act.command, sent: act.body.version, got: act.reply.version });
    }
  }
  const versions = countBy(acts.filter((a) => a.command === "customers.change" && a.verdict === "acknowledged").map((a) => ({ key: `${a.reply.id} version ${a.reply.version}` })));
  for (const [key, n] of versions) if (n > 1) doubled.push({ key, command: "customers.change", what: "two edits took one version", n });
  const sentKeys = new Set(acts.map((a) => a.key));
  const unasked = [...log.keys()].filter((key) => !sentKeys.has(key));
  const passed = acts.filter((a) => MUST_FAIL.includes(a.kind) && a.verdict === "acknowledged");
  const faults = [
    ...lost.map((f) => ({ fault: "lost", ...f })), ...doubled.map((f) => ({ fault: "doubled", ...f })), ...differing.map((f) => ({ fault: "answers differ", ...f })),
    ...unasked.map((key) => ({ fault: "effect without a command", key })), ...passed.map((a) => ({ fault: "should have been refused", kind: a.kind, key: a.key })),
    ...(await totalsDiffer(acts, o.ask)).map((f) => ({ fault: "totals differ", ...f })),
  ];
  const broken = await o.breaches();
  for (const b of broken) faults.push({ fault: `invariant ${b.id}`, says: b.says, rows: b.rows.length, first: b.rows[0] });
  const shops = await o.ask("select id, slug from shops");
  for (const s of shops) {
    const fault = o.chainFault(await o.chainRows(s.id));
    if (fault) faults.push({ fault: "audit chain", shop: s.slug, ...fault });
  }
  for (const f of await filesBroken(o.ask, o.filesFolder)) faults.push({ fault: "file", ...f });
  const mails = await o.ask("select id, state from mail_messages");
  for (const m of mails.filter((x) => x.state !== "sent")) faults.push({ fault: "mail not sent", ...m });
  const arrived = o.mails();
  for (const m of mails) if (!arrived.has(m.id)) faults.push({ fault: "mail never arrived", id: m.id });
  const jobs = await o.ask("select task, count(*)::int as n from jobs where done_at is null group by 1");
  for (const j of jobs) faults.push({ fault: "job left", ...j });
  const tally = (verdict) => acts.filter((a) => a.verdict === verdict).length;
  return {
    figures: {
      sent: acts.length, acknowledged: tally("acknowledged"), refused: tally("refused"), unknown: tally("unknown"), lost: new Set(lost.map((l) => l.key)).size, doubled: new Set(doubled.map((d) => d.key)).size,
      repeats: total(acts, (a) => Math.max(0, a.outcomes.length - 1)), mails: mails.length, mailsTwice: total([...arrived.values()], (n) => n - 1), trail: total(await o.ask("select count(*)::int as n from audit_log"), (r) => r.n),
      brokenInvariants: broken.length, byCommand: Object.fromEntries([...countBy(acts.filter((a) => a.verdict === "acknowledged").map((a) => ({ key: a.command })))].sort()),
    },
    faults,
  };
}
