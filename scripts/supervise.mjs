/** Starts the processes of the product, keeps them running, and stops them all, whatever happens to the command. */
import { spawn } from "node:child_process";
import fs from "node:fs";
import path from "node:path";
import { Problem, say } from "./say.mjs";
import { clusterState, stopCluster } from "./postgres.mjs";

const PROJECT = path.resolve(import.meta.dirname, "..");
const sleep = (ms) => new Promise((resolve) => setTimeout(resolve, ms));
const tail = (file, lines = 15) => (fs.existsSync(file) ? fs.readFileSync(file, "utf8").trimEnd().split("\n").slice(-lines).join("\n") : "");

const typescript = (file, ...conditions) => [...conditions.map((c) => `--conditions=${c}`), "--import", "tsx", file];

/** How each process is started. */
export const PROGRAMS = {
  web: { args: (server) => [path.join(server, "server.js")] },
  worker: { args: () => typescript("worker/run.ts", "react-server") },
  mail: { args: () => typescript("tests/fakes/mail/run.ts") },
  payments: { args: () => typescript("tests/fakes/stripe/run.ts") },
};

/**
 * @param logs folder for one log file a process
 * @returns `start`, `stop`, `waitFor`, `adoptCluster`
 */
export function supervisor({ logs, quiet = false }) {
  fs.mkdirSync(logs, { recursive: true });
  const children = new Map();
  let stopping = false;
  let cluster = null;
  const guard = spawn(process.execPath, [path.join(import.meta.dirname, "guard.mjs")], { detached: true, stdio: ["pipe", "ignore", "ignore"], cwd: PROJECT });
  guard.stdin.on("error", () => {});
  guard.unref();
  const tell = (message) => guard.stdin.write(`${JSON.stringify(message)}\n`);

  function launch(entry) {
    const { name, args, env, cwd, log } = entry;
    const out = fs.openSync(log, "a");
    const child = spawn(process.execPath, args, { cwd, env, detached: true, stdio: ["ignore", out, out] });
    fs.closeSync(out);
    entry.child = child;
    entry.startedAt = Date.now();
    entry.ended = new Promise((resolve) => {
      const end = (code, signal) => {
        tell({ remove: child.pid });
        resolve();
        if (stopping || entry.wanted === false) return;
        // Died by itself: start it again, but not for ever.
        entry.deaths = entry.deaths.filter((t) => Date.now() - t < 60_000).concat(Date.now());
        if (entry.deaths.length > 5) {
          entry.failed = true;
          console.error(`\nThe ${name} process keeps stopping (${signal ?? `exit code ${code}`}). The end of ${path.relative(PROJECT, log)}:\n${tail(log)}\n`);
          return;
        }
        if (!quiet) say(`The ${name} process stopped (${signal ?? `exit code ${code}`}); starting it again. Log: ${path.relative(PROJECT, log)}`);
        setTimeout(() => !stopping && entry.wanted && launch(entry), entry.deaths.length > 1 ? 1000 : 50);
      };
      child.once("error", (error) => {
        fs.appendFileSync(log, `${error.stack}\n`);
        end(null, error.code);
      });
      child.once("exit", end);
    });
    if (child.pid !== undefined) tell({ add: child.pid });
    return child;
  }

  return {
    start(name, { server, env, args }) {
      const entry = {
        name, env, cwd: name === "web" ? server : PROJECT, log: path.join(logs, `${name}.log`),
        args: args ?? PROGRAMS[name].args(server), deaths: [], wanted: true, failed: false,
      };
      children.set(name, entry);
      launch(entry);
    },
    pidOf: (name) => children.get(name)?.child?.pid,
    /** Wait until a process answers on its address. */
    async waitFor(name, url, seconds = 60) {
      const entry = children.get(name);
      const until = Date.now() + seconds * 1000;
      for (;;) {
        if (entry.failed || entry.deaths.length > 2) throw new Problem(`The ${name} process does not start. The end of ${path.relative(PROJECT, entry.log)}:\n${tail(entry.log)}`);
        try {
          const answer = await fetch(url, { redirect: "manual", signal: AbortSignal.timeout(5000) });
          if (answer.status < 500) return;
        } catch {
          // Not listening yet.
        }
        if (Date.now() > until) throw new Problem(`The ${name} process does not answer on ${url}. The end of ${path.relative(PROJECT, entry.log)}:\n${tail(entry.log)}`);
        await sleep(60);
      }
    },
    /** From now on stopping includes this database. */
    adoptCluster(place) {
      cluster = place;
      tell({ cluster: place });
    },
    /** Look at the adopted database now and then, and start it again when it is gone. */
    keepCluster(start) {
      let busy = false;
      const timer = setInterval(async () => {
        if (stopping || busy || clusterState(cluster).state === "running") return;
        busy = true;
        say("The database stopped; starting it again");
        try {
          await start();
        } catch (error) {
          console.error(error instanceof Problem ? error.message : error);
        }
        busy = false;
        if (stopping) stopCluster(cluster);
      }, 1000);
      timer.unref();
    },
    async stopOne(name, signal = "SIGTERM") {
      const entry = children.get(name);
      if (entry?.child === undefined) return;
      entry.wanted = false;
      entry.child.kill(signal);
      await entry.ended;
    },
    async stop() {
      if (stopping) return;
      stopping = true;
      const kill = (signal) => {
        for (const { child } of children.values()) {
          try {
            process.kill(-child.pid, signal);
          } catch {
            // Gone already.
          }
        }
      };
      kill("SIGTERM");
      const all = Promise.all([...children.values()].map((entry) => entry.ended));
      if ((await Promise.race([all.then(() => true), sleep(8000)])) !== true) {
        kill("SIGKILL");
        await all;
      }
      if (cluster !== null) stopCluster(cluster);
      tell({ done: true });
      guard.stdin.end();
    },
  };
}

/** Resolves when the person, the terminal or npm asks to stop. */
export function askedToStop() {
  return new Promise((resolve) => {
    for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.on(signal, () => resolve(signal));
    // npm killed hard tells nobody: its grandchild sees its line of parents change.
    const line = parents();
    if (process.env.npm_lifecycle_event) setInterval(() => parents() !== line && resolve("npm is gone"), 1000).unref();
  });
}

/** Parent and grandparent (npm starts a shell in between), where the system tells. */
function parents() {
  const parent = process.ppid;
  try {
    const stat = fs.readFileSync(`/proc/${parent}/stat`, "utf8");
    return `${parent} ${stat.slice(stat.lastIndexOf(")") + 2).split(" ")[1]}`;
  } catch {
    return String(parent);
  }
}
