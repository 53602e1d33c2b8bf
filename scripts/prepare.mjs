/** What has to be in place before anything can run: packages, and a built server that matches the sources. */
import { spawn, spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import fs from "node:fs";
import path from "node:path";
import { aptInstall } from "./postgres.mjs";
import { Problem, say } from "./say.mjs";

const PROJECT = path.resolve(import.meta.dirname, "..");
const at = (...parts) => path.join(PROJECT, ...parts);
const sha = (data) => createHash("sha256").update(data).digest("hex");
const readJson = (file) => JSON.parse(fs.readFileSync(file, "utf8"));

/** Run a program to its end with its output shown; refuse with `failure` when it fails. */
export function runShown(program, args, options, failure) {
  return new Promise((resolve, reject) => {
    const child = spawn(program, args, { cwd: PROJECT, stdio: ["ignore", "inherit", "inherit"], ...options });
    child.once("error", reject);
    child.once("exit", (code, signal) => (code === 0 ? resolve() : reject(new Problem(`${failure} (${signal ?? `exit code ${code}`})`))));
  });
}

// ── packages ─────────────────────────────────────────────────────────────────

/** Whether what is installed is what the lock file names, read from npm's own list of what it installed. */
function matchesLock() {
  const installed = at("node_modules/.package-lock.json");
  if (!fs.existsSync(installed)) return false;
  const have = readJson(installed).packages;
  const want = readJson(at("package-lock.json")).packages;
  return Object.entries(want).every(([name, { version, optional, devOptional, peer }]) =>
    name === "" || have[name]?.version === version || (have[name] === undefined && (optional || devOptional || peer)));
}

export async function ensurePackages() {
  const stamp = at("node_modules/.valvekeeper-lock");
  const lock = sha(fs.readFileSync(at("package-lock.json")));
  if (fs.existsSync(stamp) && fs.readFileSync(stamp, "utf8") === lock) return;
  if (!matchesLock()) {
    say("Installing packages (npm ci, a minute or two)");
    await runShown("npm", ["ci", "--include=dev", "--no-audit", "--no-fund", "--loglevel=error"], {}, "npm ci failed: see above");
  }
  fs.writeFileSync(stamp, lock);
}

/** Debian's Chromium or another one on the path. */
export function ensureChromium() {
  const find = () => ["chromium", "chromium-browser", "google-chrome"]
    .map((name) => spawnSync("sh", ["-c", `command -v ${name}`], { encoding: "utf8" }).stdout.trim()).find(Boolean);
  const found = process.env.VK_CHROMIUM || find();
  if (found) return found;
  if (process.getuid() !== 0 || !fs.existsSync("/usr/bin/apt-get")) {
    throw new Problem("Chromium was not found; the browser journeys need it. Install it (as root: apt-get install chromium) and run again.\nVK_CHROMIUM may name its program.");
  }
  say("Installing Chromium (a minute or two)");
  aptInstall(["chromium", "fonts-liberation"], "Chromium");
  const now = find();
  if (!now) throw new Problem("Chromium was installed but can't be found.");
  return now;
}

// ── build ────────────────────────────────────────────────────────────────────

const SOURCES = ["app", "modules", "db", "public", "components", "package.json", "package-lock.json", "tsconfig.json",
  "next.config.ts", "tailwind.config.ts", "postcss.config.mjs", "proxy.ts", "instrumentation.ts"];
const NOT_BUILT = /\.(?:int\.)?test\.tsx?$|\.md$/;

function* filesBelow(name) {
  const whole = at(name);
  if (!fs.existsSync(whole)) return;
  if (fs.statSync(whole).isFile()) {
    yield name;
    return;
  }
  for (const child of fs.readdirSync(whole).sort()) yield* filesBelow(path.join(name, child));
}

/** One hash over all that the build reads. */
export function sourcesHash() {
  const hash = createHash("sha256").update(process.version);
  for (const source of SOURCES) {
    for (const file of filesBelow(source)) {
      if (NOT_BUILT.test(file)) continue;
      hash.update(`${file}\0`).update(fs.readFileSync(at(file)));
    }
  }
  return hash.digest("hex");
}

const stampFile = () => at(".next/valvekeeper-sources");
const builtFrom = () => (fs.existsSync(stampFile()) ? fs.readFileSync(stampFile(), "utf8") : "");

/** Only one build at a time in this folder, also when `npm start` and `npm test` meet. */
async function withBuildLock(work) {
  const lock = at("node_modules/.valvekeeper-build");
  for (let waited = false; ; waited = true) {
    try {
      fs.writeFileSync(lock, String(process.pid), { flag: "wx" });
      break;
    } catch (error) {
      if (error.code !== "EEXIST") throw error;
      const owner = Number(fs.readFileSync(lock, "utf8"));
      let lives = true;
      try {
        process.kill(owner, 0);
      } catch {
        lives = false;
      }
      if (!lives || !owner) fs.rmSync(lock, { force: true });
      else {
        if (!waited) say("Waiting for another build in this folder");
        await new Promise((resolve) => setTimeout(resolve, 500));
      }
    }
  }
  try {
    return await work();
  } finally {
    fs.rmSync(lock, { force: true });
  }
}

async function build(hash) {
  say("Building the application (a minute or two)");
  // What a failed or interrupted build left behind can make the next one fail. A development server keeps its own part.
  if (fs.existsSync(at(".next"))) {
    for (const part of fs.readdirSync(at(".next"))) if (part !== "dev") fs.rmSync(at(".next", part), { recursive: true, force: true });
  }
  await runShown(process.execPath, [at("node_modules/next/dist/bin/next"), "build"], {
    env: { ...process.env, NODE_ENV: "production", NEXT_TELEMETRY_DISABLED: "1" },
  }, "The build failed: see above");
  const standalone = at(".next/standalone");
  if (!fs.existsSync(path.join(standalone, "server.js"))) throw new Problem("The build made no server: next.config.ts must say output: \"standalone\".");
  if (fs.existsSync(at("public"))) fs.cpSync(at("public"), path.join(standalone, "public"), { recursive: true });
  fs.cpSync(at(".next/static"), path.join(standalone, ".next/static"), { recursive: true });
  fs.writeFileSync(stampFile(), hash);
}

/**
 * A built server in `folder`/server, made anew when the sources changed. It is a copy made of hard links: a later
 * build does not pull the files from under a server that runs.
 */
export async function ensureServer(folder) {
  const server = path.join(folder, "server");
  const mark = path.join(server, "valvekeeper-sources");
  const hash = sourcesHash();
  if (fs.existsSync(mark) && fs.readFileSync(mark, "utf8") === hash) return server;
  await withBuildLock(async () => {
    if (builtFrom() !== hash) await build(hash);
    const next = `${server}.new`;
    fs.rmSync(next, { recursive: true, force: true });
    fs.mkdirSync(folder, { recursive: true });
    const linked = spawnSync("cp", ["-al", at(".next/standalone"), next]);
    if (linked.status !== 0) {
      fs.rmSync(next, { recursive: true, force: true });
      fs.cpSync(at(".next/standalone"), next, { recursive: true });
    }
    fs.writeFileSync(path.join(next, "valvekeeper-sources"), hash);
    fs.rmSync(server, { recursive: true, force: true });
    fs.renameSync(next, server);
  });
  return server;
}
