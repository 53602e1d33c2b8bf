/**
 * `npm test`: every check of the project, with all its own set-up, beside a product that may be running.
 *
 *   npm test                              everything
 *   npm test -- --only types,lint         parts: types, lint, vitest, journeys
 */
import { spawn } from "node:child_process";
import fs from "node:fs";
import path from "node:path";
import { PORTS, PROJECT } from "./environment.mjs";
import { openProduct, TEST_FOLDER } from "./product.mjs";
import { clusterPlace, clusterState, startCluster, stopCluster } from "./postgres.mjs";
import { portFrom } from "./ports.mjs";
import { ensureChromium, ensurePackages } from "./prepare.mjs";
import { heading, Problem, run, say } from "./say.mjs";

const bin = (...parts) => path.join(PROJECT, "node_modules", ...parts);
const PARTS = ["types", "lint", "vitest", "journeys"];

/** Children of this run, so that stopping it stops them. */
const children = new Set();

/** Run a program; `captured` collects what it prints instead of showing it at once. */
function execute(args, { captured = false, env = {} } = {}) {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, args, {
      cwd: PROJECT, env: { ...process.env, NEXT_TELEMETRY_DISABLED: "1", ...env }, stdio: ["ignore", captured ? "pipe" : "inherit", captured ? "pipe" : "inherit"],
    });
    children.add(child);
    let text = "";
    for (const stream of [child.stdout, child.stderr]) stream?.on("data", (chunk) => { text += chunk; });
    child.once("error", (error) => { text += error.stack; });
    child.once("close", (code) => {
      children.delete(child);
      resolve({ ok: code === 0, text: text.trimEnd() });
    });
  });
}

const total = { passed: 0, failed: 0 };
const failedParts = [];

function step(name, ok, seconds) {
  say(`${name}: ${ok ? "passed" : "FAILED"}${seconds === undefined ? "" : ` (${seconds} s)`}`);
  if (!ok) failedParts.push(name);
}

const since = (start) => Math.round((Date.now() - start) / 1000);

async function types() {
  const made = await execute([bin("next/dist/bin/next"), "typegen"], { captured: true });
  return made.ok ? execute([bin("typescript/bin/tsc"), "--noEmit"], { captured: true }) : made;
}

const lint = () => execute([bin("eslint/bin/eslint.js"), "--max-warnings=0", "."], { captured: true });

/** Files, exports and packages that nothing uses. */
const deadCode = () => execute([bin("knip/bin/knip.js")], { captured: true });

/** Types and lint use one core each: side by side, shown one after the other; dead code is looked for behind the types. */
async function checkSources(parts) {
  const start = Date.now();
  const jobs = [["types", "Types", types], ["lint", "Lint", lint]].filter(([part]) => parts.has(part)).map(([, name, work]) => [name, work()]);
  if (jobs[0]?.[0] === "Types") jobs.splice(1, 0, ["Dead code", jobs[0][1].then(deadCode)]);
  for (const [name, work] of jobs) {
    heading(name);
    const { ok, text } = await work;
    if (text !== "") console.log(text);
    if (!ok) total.failed += 1;
    step(name, ok, since(start));
  }
}

const readJson = (file) => (fs.existsSync(file) ? JSON.parse(fs.readFileSync(file, "utf8")) : null);

async function vitest() {
  heading("Unit, architecture, published checks, integration");
  const start = Date.now();
  const file = path.join(TEST_FOLDER, "vitest.json");
  fs.rmSync(file, { force: true });
  const { ok } = await execute([bin("vitest/vitest.mjs"), "run", "--reporter=dot", "--reporter=json", `--outputFile.json=${file}`], { env: { CI: "true" } });
  const report = readJson(file);
  total.passed += report?.numPassedTests ?? 0;
  total.failed += report?.numFailedTests ?? 0;
  // A file that can't be loaded has no failed test in it, but it is a failure.
  const brokenFiles = (report?.testResults ?? []).filter((f) => f.status === "failed" && f.assertionResults.every((a) => a.status !== "failed")).length;
  total.failed += brokenFiles;
  if (!ok && (report === null || report.numFailedTests + brokenFiles === 0)) total.failed += 1;
  step("Vitest", ok, since(start));
}

/** Errors that the built server wrote to its log: it marks each with a cross. */
const unseenFaults = (log) => (fs.existsSync(log) ? fs.readFileSync(log, "utf8").split("\n").filter((line) => line.includes("⨯")) : []);

function testPorts() {
  return Object.fromEntries(Object.entries(PORTS.test).map(([name, [variable, fallback]]) => [name, portFrom(variable, fallback)]));
}

let product = null;

async function journeys(chromium) {
  heading("Browser journeys");
  const start = Date.now();
  try {
    product = await openProduct({ name: "vk_journeys", ports: testPorts(), clock: true, demo: true });
  } catch (error) {
    total.failed += 1;
    console.error(error instanceof Problem ? error.message : error);
    step("Journeys", false, since(start));
    return;
  }
  say(`The product under test is ready on ${product.addresses.app}`);
  const file = path.join(TEST_FOLDER, "journeys.json");
  fs.rmSync(file, { force: true });
  const { ok } = await execute([bin("@playwright/test/cli.js"), "test"], {
    env: {
      // The journeys found their shops through the product's own commands, as the seed does.
      ...product.ownerEnv,
      E2E_CHROMIUM: chromium, E2E_BASE_URL: product.addresses.app, E2E_INBOX_URL: product.addresses.inbox, E2E_PAY_URL: product.addresses.payments,
      E2E_CLOCK_FILE: product.clockFile, E2E_OWNER_URL: product.ownerEnv.VK_OWNER_URL, E2E_PIN_PEPPER: product.env.VK_PIN_PEPPER,
      E2E_SIGN_INS_FILE: product.env.VK_SIGN_INS_FILE, E2E_REPORT: file,
    },
  });
  const stats = readJson(file)?.stats;
  total.passed += (stats?.expected ?? 0) + (stats?.flaky ?? 0);
  total.failed += stats?.unexpected ?? 0;
  if (!ok && !stats?.unexpected) total.failed += 1;
  const logs = path.join(product.folder, "logs");
  await product.close();
  product = null;
  // A page that broke on the server and was mended by the browser looks well to a journey.
  const broke = unseenFaults(path.join(logs, "web.log"));
  if (broke.length > 0) {
    total.failed += 1;
    console.log(`The server broke ${broke.length} times while the journeys ran:\n${[...new Set(broke)].join("\n")}`);
  }
  if (!ok || broke.length > 0) console.log(`Logs of the product under test: ${path.relative(PROJECT, logs)}`);
  step("Journeys", ok && broke.length === 0, since(start));
}

/** One run at a time in this folder: two would pull the ground from under each other. */
function lock() {
  fs.mkdirSync(TEST_FOLDER, { recursive: true });
  const file = path.join(TEST_FOLDER, "run.pid");
  const other = fs.existsSync(file) ? Number(fs.readFileSync(file, "utf8")) : 0;
  if (other > 0 && other !== process.pid) {
    let lives = true;
    try {
      process.kill(other, 0);
    } catch {
      lives = false;
    }
    if (lives && isTestRun(other)) throw new Problem(`Another npm test runs in this folder (process ${other}). Wait for it, or stop it.`);
  }
  fs.writeFileSync(file, String(process.pid));
  return () => fs.rmSync(file, { force: true });
}

function isTestRun(pid) {
  try {
    return fs.readFileSync(`/proc/${pid}/cmdline`, "utf8").includes("test.mjs");
  } catch {
    return true;
  }
}

function partsWanted() {
  const at = process.argv.indexOf("--only");
  const parts = at < 0 ? PARTS : (process.argv[at + 1] ?? "").split(",");
  const unknown = parts.filter((part) => !PARTS.includes(part));
  if (unknown.length > 0) throw new Problem(`There is no part "${unknown.join(", ")}". Parts are: ${PARTS.join(", ")}.`);
  return new Set(parts);
}

await run(async () => {
  const parts = partsWanted();
  const unlock = lock();
  const place = clusterPlace("test");
  const startedHere = clusterState(place).state !== "running";
  const tidy = async () => {
    for (const child of children) child.kill("SIGTERM");
    await product?.close();
    if (startedHere && clusterState(place).state === "running") stopCluster(place);
    unlock();
  };
  for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.once(signal, () => void tidy().then(() => process.exit(130)));
  try {
    heading("Setting up");
    await ensurePackages();
    const chromium = parts.has("journeys") ? ensureChromium() : "";
    if (parts.has("vitest") || parts.has("journeys")) await startCluster(place);
    await checkSources(parts);
    if (parts.has("vitest")) await vitest();
    if (parts.has("journeys")) await journeys(chromium);
  } finally {
    await tidy();
  }
  heading("All together");
  if (failedParts.length > 0) console.log(`Not passed: ${failedParts.join(", ")}`);
  console.log(`${total.passed} passed, ${total.failed} failed`);
  if (total.failed > 0 || failedParts.length > 0) process.exitCode = 1;
});
