/**
 * Pages and addresses of the API of a product of its own with the demo's data, as ratios to the floor of the same run: an
 * almost empty page, and a bare `select 1`. Absolute times say more about the machine than about the product.
 *
 *   npm run bench                        8 clients, 4 rounds of 2 s each
 *   npm run bench -- --rounds 8 --ms 4000 --clients 8
 *   npm run bench -- --no-load           without the flow libraries of a hundred and of ten thousand tests
 *   npm run bench -- --from-sources      served by the development server: only to see that it runs, its figures mean nothing
 */
import fs from "node:fs";
import path from "node:path";
import { PROJECT } from "./environment.mjs";
import { ensureChromium, ensurePackages } from "./prepare.mjs";
import { openProduct, TEST_FOLDER } from "./product.mjs";
import { portFrom } from "./ports.mjs";
import { heading, Problem, run, say } from "./say.mjs";

const number = (argv, name, fallback) => {
  const at = argv.indexOf(`--${name}`);
  if (at < 0) return fallback;
  const n = Number(argv[at + 1]);
  if (!Number.isInteger(n) || n < 1) throw new Problem(`--${name} is a whole number above 0.`);
  return n;
};

const FLOOR_PAGE = "empty page";
const FLOOR_QUERY = "select 1";

const page = (app, at, cookie) => async () => {
  const answer = await fetch(`${app}${at}`, { headers: cookie ? { cookie } : {}, redirect: "manual", signal: AbortSignal.timeout(30_000) });
  const text = await answer.text();
  if (answer.status !== 200) throw new Problem(`${at} answered ${answer.status}, not 200: ${text.slice(0, 200)}`);
};

/** The pages people have open all day, with the sizes they have in the demo. */
function targetsOf(facts, app, cookie) {
  const s = `/s/${facts.slug}`;
  const api = `/api/v1/s/${facts.slug}`;
  const list = [
    ["floor", s], ["orders", `${s}/orders`], ["order", facts.order && `${s}/orders/${facts.order}`], ["parts", `${s}/parts`], ["flow room", `${s}/flow`], ["flow sheet", facts.headId && `${s}/flow/${facts.headId}`],
    [`flow family, ${facts.tests} tests`, facts.family && `${s}/flow/library/family?family=${encodeURIComponent(facts.family)}`], [`flow overlay, ${facts.tests} tests`, facts.pair.length === 2 && `${s}/flow/library/overlay?a=${facts.pair[0]}&b=${facts.pair[1]}`],
    [`flow library, ${facts.tests} tests`, `${s}/flow/library`], ["books", `${s}/books`], ["journal", `${s}/books/journal`], ["time", `${s}/time`],
    ["API orders", `${api}/orders`], ["API parts", `${api}/parts`], ["API find", `${api}/find?q=a`], [`API flow library, ${facts.tests} tests`, `${api}/flow/library`], ["API invoices", `${api}/invoices`],
  ];
  const own = list.filter(([, at]) => at).map(([name, at]) => ({ name, once: page(app, at, cookie) }));
  return facts.link ? [...own, { name: "customer link", once: page(app, facts.link, "") }] : own;
}

function table(results) {
  const floor = results.get(FLOOR_PAGE);
  const query = results.get(FLOOR_QUERY);
  const pad = (text, n) => String(text).padStart(n);
  console.log(`\n  ${"".padEnd(36)}${pad("p50 ms", 9)}${pad("p95 ms", 9)}${pad("a second", 10)}${pad("p50 x page", 12)}${pad("p50 x query", 13)}${pad("speed / page", 14)}`);
  for (const [name, r] of results) {
    console.log(`  ${name.padEnd(36)}${pad(r.p50.toFixed(1), 9)}${pad(r.p95.toFixed(1), 9)}${pad(r.perSecond.toFixed(0), 10)}${pad((r.p50 / floor.p50).toFixed(2), 12)}${pad((r.p50 / query.p50).toFixed(1), 13)}${pad(`${((100 * r.perSecond) / floor.perSecond).toFixed(0)} %`, 14)}`);
  }
}

await run(async () => {
  const argv = process.argv.slice(2);
  await ensurePackages();
  const { measure } = await import("./bench/measure.mjs");
  const { measureEntry, PACE } = await import("./bench/entry.mjs");
  const { beginTest, measureTyping } = await import("./bench/typing.mjs");
  const { signIn } = await import("./drill/sign-in.mjs");
  const { runTypescript } = await import("./database.mjs");
  const { default: pg } = await import("pg");
  const shape = { clients: number(argv, "clients", 8), rounds: number(argv, "rounds", 4), ms: number(argv, "ms", 2000), warmMs: 1500 };
  const fromSources = argv.includes("--from-sources");
  // Durable, as in use: a floor measured without fsync would flatter nothing that writes, but would not be the same machine.
  const place = { base: path.join(process.env.VK_PG_ROOT ? path.resolve(process.env.VK_PG_ROOT) : PROJECT, ".test/bench-postgres"), port: portFrom("VK_BENCH_PG_PORT", 54359), variable: "VK_BENCH_PG_PORT", durable: true };
  heading("Opening a product of its own, with the demo");
  const product = await openProduct({ name: "vk_bench", place, folder: path.join(TEST_FOLDER, "bench"), demo: true, fromSources, ports: { web: portFrom("VK_BENCH_PORT", 3400), mail: 2825, inbox: 3425, pay: 3430 } });
  product.supervised.adoptCluster(place);
  const app = product.addresses.app;
  const pool = new pg.Pool({ connectionString: product.env.VK_DATABASE_URL, max: shape.clients });
  try {
    const signIns = JSON.parse(fs.readFileSync(product.env.VK_SIGN_INS_FILE, "utf8"));
    const owner = signIns.find((s) => s.role === "owner");
    if (!owner) throw new Problem("The demo has no owner to sign in.");
    const cookie = await signIn(app, owner);
    const factsNow = async (families = "") => JSON.parse((await runTypescript("scripts/bench/facts.ts", { ...product.ownerEnv, BENCH_FAMILIES: families }, "The demo could not be read:", ["react-server"])).trim().split("\n").at(-1));
    const floor = [{ name: FLOOR_PAGE, once: page(app, "/sign-in", "") }, { name: FLOOR_QUERY, once: () => pool.query("select 1") }];
    const facts = await factsNow();
    heading(`${shape.clients} clients, ${shape.rounds} rounds of ${shape.ms} ms each, over the demo`);
    table(await measure([...floor, ...targetsOf(facts, app, cookie)], shape, (i) => say(`round ${i}`)));
    if (facts.gear && facts.waitingHeadId) {
      heading("From a key to the picture that follows it");
      await beginTest({ app, cookie, slug: facts.slug, headId: facts.waitingHeadId, gear: facts.gear });
      const { floor: bare, sheet } = await measureTyping({ app, cookie, sheet: `/s/${facts.slug}/flow/${facts.waitingHeadId}`, executablePath: ensureChromium() });
      for (const [name, r] of [["bare field", bare], ["flow sheet", sheet]]) console.log(`  ${name.padEnd(14)}${r.keys} keys, p50 ${r.p50} ms, p95 ${r.p95} ms, worst ${r.worst} ms`);
      console.log(`  Worst key of the sheet: ${(sheet.worst / bare.worst).toFixed(2)} x the bare field's; ${sheet.worst <= 100 ? "within" : "NOT within"} 100 ms.`);
    }
    if (facts.freshHeadId) {
      heading("A head before and after, intake and exhaust, by keyboard alone");
      const r = await measureEntry({ app, cookie, sheet: `/s/${facts.slug}/flow/${facts.freshHeadId}`, executablePath: ensureChromium() });
      console.log(`  ${r.lifts} lifts a side: ${r.keys} keys and ${r.decisions} decisions; played by the browser in ${r.browserSeconds.toFixed(0)} s, ${r.waited.toFixed(1)} s of it waiting.`);
      console.log(`  At ${PACE.key} s a key and ${PACE.decide} s a decision, what was waited for added: ${r.personSeconds.toFixed(0)} s; ${r.personSeconds <= 180 ? "within" : "NOT within"} 3 minutes. Reckoned, not timed with a person.`);
    }
    for (const tests of argv.includes("--no-load") ? [] : [100, 10_000]) {
      heading(`The flow room and library with ${tests} more tests of 24 lifts`);
      await runTypescript("scripts/bench/load.ts", { ...product.ownerEnv, BENCH_TESTS: String(tests) }, "The flow library could not be filled:", ["react-server"]);
      table(await measure([...floor, ...targetsOf(await factsNow(`Load family L${tests}-`), app, cookie).filter((t) => /flow/.test(t.name))], shape, (i) => say(`round ${i}`)));
    }
    console.log("\n  Ratios compare within this run only. Floor page: sign-in, rendered anew for each request. Floor query: through the same driver.");
  } finally {
    await pool.end();
    await product.close();
  }
});
