/**
 * Drives a mix of commands over HTTP into a product of its own while web, worker and database are killed at random, then
 * checks: whatever was acknowledged is there exactly once, what never got an answer is there once or not at all, every
 * invariant holds, the trail is whole.
 *
 *   npm run drill                                   2,000 commands, 12 kills
 *   npm run drill -- --commands 10000 --kills 50 --seed 7
 *   npm run drill -- --plant answer-before-commit   with a mistake built into a copy of the sources: the drill must find it
 *   npm run drill -- --from-sources                 served by the development server: no build, slower to come back
 */
import fs from "node:fs";
import path from "node:path";
import { PROJECT } from "./environment.mjs";
import { ensurePackages } from "./prepare.mjs";
import { openProduct, TEST_FOLDER } from "./product.mjs";
import { portFrom } from "./ports.mjs";
import { heading, Problem, run, say } from "./say.mjs";

const sleep = (ms) => new Promise((resolve) => setTimeout(resolve, ms));
const CLIENTS = 8;

export function options(argv) {
  const value = (name, fallback) => {
    const at = argv.indexOf(`--${name}`);
    if (at < 0) return fallback;
    const n = Number(argv[at + 1]);
    if (!Number.isSafeInteger(n) || n < 0) throw new Problem(`--${name} is a whole number of 0 or more.`);
    return n;
  };
  const plantAt = argv.indexOf("--plant");
  return {
    commands: value("commands", 2000), kills: value("kills", 12), seed: value("seed", Date.now() % 1_000_000), fromSources: argv.includes("--from-sources"),
    plant: plantAt < 0 ? null : (argv[plantAt + 1] ?? ""),
  };
}

const percentile = (sorted, p) => sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * p))] ?? 0;

/** Counts what the clients hear while it happens. */
function ears() {
  const seen = { statuses: new Map(), latest: [], slow: 0, firstGoodAfter: [], unclear: [] };
  let waitingSince = null;
  return {
    seen,
    killed: () => { waitingSince ??= Date.now(); },
    heard(outcome) {
      seen.statuses.set(outcome.status, (seen.statuses.get(outcome.status) ?? 0) + 1);
      if (outcome.status >= 200 && outcome.status < 300) {
        seen.latest.push(outcome.ms);
        if (waitingSince !== null) {
          seen.firstGoodAfter.push(Date.now() - waitingSince);
          waitingSince = null;
        }
      }
      if (outcome.ms > 5000) seen.slow += 1;
      // A database that is away is no fault of the product's own, and the caller must hear when to come again.
      if (outcome.status === 500) seen.unclear.push({ fault: "answered 500", reply: outcome.reply });
      if (outcome.status === 503 && !(Number(outcome.retryAfter) > 0)) seen.unclear.push({ fault: "503 without Retry-After", reply: outcome.reply });
    },
  };
}

async function superuser(product) {
  const { default: pg } = await import("pg");
  return async (text, values) => {
    const client = new pg.Client({ host: "127.0.0.1", port: product.cluster.port, user: "postgres", password: product.cluster.password, database: "vk_drill", connectionTimeoutMillis: 5000 });
    client.on("error", () => {});
    await client.connect();
    try {
      return (await client.query(text, values)).rows;
    } finally {
      await client.end().catch(() => {});
    }
  };
}

/** Asks again until the database answers: for what the drill itself must know while it is being killed. */
const patiently = (ask) => async (text, values) => {
  for (let tries = 0; ; tries++) {
    try {
      return await ask(text, values);
    } catch (error) {
      if (tries > 200) throw error;
      await sleep(150);
    }
  }
};

function mailsArrived(folder) {
  const arrived = new Map();
  const mail = path.join(folder, "mail");
  for (const name of fs.existsSync(mail) ? fs.readdirSync(mail) : []) {
    if (!name.endsWith(".json")) continue;
    const id = /^<?([0-9a-f-]{36})@/.exec(JSON.parse(fs.readFileSync(path.join(mail, name), "utf8")).messageId)?.[1];
    if (id) arrived.set(id, (arrived.get(id) ?? 0) + 1);
  }
  return arrived;
}

async function passOf(appUrl, shop, n, token) {
  for (let tries = 0; ; tries++) {
    try {
      const { randomUUID } = await import("node:crypto");
      const answer = await fetch(`${appUrl}/api/v1/clock/identify`, {
        method: "POST", signal: AbortSignal.timeout(10_000), body: JSON.stringify({ kind: "badge", badge: shop.badges[n] }),
        headers: { authorization: `Bearer ${token}`, "content-type": "application/json", "idempotency-key": randomUUID() },
      });
      if (answer.ok) {
        const { personId, pass } = await answer.json();
        return { kind: "pass", personId, pass };
      }
      if (answer.status < 500 && answer.status !== 429) throw new Problem(`The tablet does not know ${shop.badges[n]}: ${answer.status} ${await answer.text()}`);
    } catch (error) {
      if (error instanceof Problem || tries > 200) throw error;
    }
    await sleep(150);
  }
}

/** Every address once, so that no first compile stands in the figures. */
async function warm(product, shop, cookies) {
  const { randomUUID } = await import("node:crypto");
  const posts = ["customers", "customers/change", "orders/open", "orders/need-part", "orders/issue-part", "parts/count", "parts/opening", "purchases/draft", "purchases/send", "purchases/receive", "payments/take", "flow/readings"];
  for (const p of posts) {
    const answer = await fetch(`${product.addresses.app}/api/v1/s/${shop.slug}/${p}`, { method: "POST", body: "{}", headers: { "content-type": "application/json", "idempotency-key": randomUUID(), origin: product.addresses.app, cookie: cookies.owner }, signal: AbortSignal.timeout(90_000) });
    if (answer.status !== 422) throw new Problem(`${p} answered ${answer.status} to an empty body, not 422: ${(await answer.text()).slice(0, 300)}`);
  }
}

async function drill({ commands, kills, seed, fromSources }) {
  const { chanceFrom } = await import("./drill/chance.mjs");
  const { openJournal } = await import("./drill/journal.mjs");
  const { runClient } = await import("./drill/client.mjs");
  const { kill, KINDS } = await import("./drill/kills.mjs");
  const { signIn } = await import("./drill/sign-in.mjs");
  const { check } = await import("./drill/check.mjs");
  const { runTypescript } = await import("./database.mjs");
  const { register } = await import("tsx/esm/api");
  register();
  const { breaches } = await import("../db/invariants.ts");
  const { chainFault } = await import("../modules/access/audit-chain.ts");

  const folder = path.join(TEST_FOLDER, "drill");
  const place = { base: path.join(process.env.VK_PG_ROOT ? path.resolve(process.env.VK_PG_ROOT) : PROJECT, ".test/drill-postgres"), port: portFrom("VK_DRILL_PG_PORT", 54349), variable: "VK_DRILL_PG_PORT", durable: true };
  heading("Opening a product of its own");
  const product = await openProduct({ name: "vk_drill", place, folder, serve: false, fromSources, ports: { web: portFrom("VK_DRILL_PORT", 3200), mail: 2725, inbox: 3225, pay: 3230 } });
  product.supervised.adoptCluster(place);
  const chance = chanceFrom(seed);
  const ask = await superuser(product);
  const askPatiently = patiently(ask);
  try {
    const { shops } = JSON.parse((await runTypescript("scripts/drill/prepare.ts", product.ownerEnv, "The shops of the drill could not be founded:", ["react-server"])).trim().split("\n").at(-1));
    await product.startWeb();
    product.startWorker();
    const cookies = {};
    for (const shop of shops) {
      cookies[shop.slug] = {};
      for (const [role, who] of Object.entries(shop.signIns)) cookies[shop.slug][role] = await signIn(product.addresses.app, who);
    }
    await warm(product, shops[0], cookies[shops[0].slug]);
    say(`${shops.length} shops, ${shops.length * 4} people signed in; seed ${seed}`);

    heading(`${commands} commands by ${CLIENTS} clients, ${kills} kills`);
    const journal = openJournal(path.join(folder, "journal.jsonl"));
    const listening = ears();
    const budget = { left: commands };
    const began = Date.now();
    const operations = await ask("select work_order_id, id from operations");
    const strangers = await ask("select shop_id, id from customers");
    let over = false;
    const clients = Promise.all(Array.from({ length: CLIENTS }, (_, i) => {
      const shop = shops[i % shops.length];
      const n = Math.floor(i / shops.length);
      const token = shop.tablets[n];
      return runClient({
        appUrl: product.addresses.app, shop, n, journal, budget, watch: listening.heard, chance: chanceFrom(seed + 1000 + i),
        foreignCustomer: strangers.find((c) => c.shop_id !== shop.id).id, operation: operations.find((o) => o.work_order_id === shop.orders[n])?.id,
        as: async (by) => (by === "tablet" ? { authorization: `Bearer ${token}` } : { cookie: cookies[shop.slug][by] }),
        passOf: () => passOf(product.addresses.app, shop, n, token),
        lineOf: async (id) => (await askPatiently("select id from purchase_order_lines where purchase_order_id = $1", [id]))[0].id,
      });
    })).finally(() => { over = true; });

    const done = [];
    // Moments of the kills: one by chance in each stretch of the commands.
    const moments = Array.from({ length: kills }, (_, i) => commands - Math.floor((commands * 0.96 * (i + chance.next())) / kills));
    const first = chance.below(KINDS.length);
    const kinds = Array.from({ length: kills }, (_, i) => KINDS[(first + i) % KINDS.length]);
    for (const [i, left] of moments.entries()) {
      while (!over && budget.left > left) await sleep(5);
      if (over) break;
      await sleep(chance.below(40));
      listening.killed();
      const hit = await kill(kinds[i], product, ask);
      done.push(hit);
      say(`killed ${hit.kind}; all started again after ${hit.downMs} ms`);
    }
    await clients;
    journal.close();
    const seconds = (Date.now() - began) / 1000;

    heading("Checking");
    // A job whose worker was killed is free again when its lease of a minute is over.
    for (let tries = 0; tries < 1500 && (await askPatiently("select 1 from jobs where done_at is null and parked_at is null limit 1")).length > 0; tries++) await sleep(100);
    const { figures, faults } = await check({
      journal: journal.file, ask: askPatiently, filesFolder: product.env.VK_FILES_DIR, mails: () => mailsArrived(folder),
      breaches: () => breaches({ query: async (text) => ({ rows: await askPatiently(text) }) }), chainFault,
      chainRows: (shopId) => askPatiently(`select seq::int, at, actor, actor_name as "actorName", command, request_id as "requestId", subject_kind as "subjectKind", subject_id as "subjectId", note, detail,
        prev_hash as "prevHash", hash from audit_log where shop_id = $1 order by seq`, [shopId]),
    });
    report({ figures, faults, seconds, seed, done, kills, seen: listening.seen });
    if (done.length < kills) console.log(`  Only ${done.length} of ${kills} kills came in time: ask for more commands.`);
    return faults.length === 0 && listening.seen.unclear.length === 0;
  } finally {
    await product.close();
  }
}

function report({ figures: f, faults, seconds, seed, done, seen }) {
  const sorted = seen.latest.sort((a, b) => a - b);
  const back = [...seen.firstGoodAfter].sort((a, b) => a - b);
  const kinds = [...new Set(done.map((k) => k.kind))].map((kind) => `${kind} ${done.filter((k) => k.kind === kind).length}`).join(", ");
  const statuses = [...seen.statuses].sort(([a], [b]) => a - b).map(([s, n]) => `${s === 0 ? "no answer" : s} ${n}`).join(", ");
  heading("What the drill has shown");
  console.log(`  seed                         ${seed}`);
  console.log(`  commands sent                ${f.sent} in ${seconds.toFixed(0)} s, ${f.repeats} sent again under their key`);
  console.log(`  writes acknowledged          ${f.acknowledged}`);
  for (const [command, n] of Object.entries(f.byCommand)) console.log(`    ${command.padEnd(27)}${n}`);
  console.log(`  refused, as they must be     ${f.refused}`);
  console.log(`  never answered               ${f.unknown}`);
  console.log(`  LOST                         ${f.lost}`);
  console.log(`  DOUBLED                      ${f.doubled}`);
  console.log(`  invariants broken            ${f.brokenInvariants} of 18; rows in the trail ${f.trail}`);
  console.log(`  mails                        ${f.mails}, sent twice ${f.mailsTwice} (under one Message-ID)`);
  console.log(`  kills                        ${done.length}: ${kinds || "none"}`);
  console.log(`  first write after a kill     median ${percentile(back, 0.5)} ms, longest ${back.at(-1) ?? 0} ms`);
  console.log(`  answers                      ${statuses}; later than 5 s: ${seen.slow}`);
  console.log(`  time of a write              p50 ${percentile(sorted, 0.5)} ms, p95 ${percentile(sorted, 0.95)} ms, p99 ${percentile(sorted, 0.99)} ms`);
  // Said apart: nothing is lost by them, and a planted mistake is not found by them.
  console.log(`  500, or 503 that names no time ${seen.unclear.length}`);
  for (const one of seen.unclear.slice(0, 10)) console.log(`    ${JSON.stringify(one)}`);
  if (faults.length === 0) return;
  console.log(`\n  ${faults.length} FAULTS; the first of them:`);
  for (const fault of faults.slice(0, 20)) console.log(`    ${JSON.stringify(fault)}`);
}

await run(async () => {
  const asked = options(process.argv.slice(2));
  await ensurePackages();
  if (asked.plant !== null) {
    const { planted } = await import("./drill/plant.mjs");
    if (!(await planted(asked))) process.exitCode = 1;
    return;
  }
  if (!(await drill(asked))) process.exitCode = 1;
});
