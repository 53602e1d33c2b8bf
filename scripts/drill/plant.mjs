/**
 * Mistakes for the drill to find. Each is written into a copy of the sources and built there, so that the product itself
 * has no switch that could be turned: a drill that passes over one of them is not worth running.
 */
import { spawn, spawnSync } from "node:child_process";
import fs from "node:fs";
import os from "node:os";
import path from "node:path";
import { PROJECT } from "../environment.mjs";
import { heading, Problem, say } from "../say.mjs";

const PLANTS = {
  "answer-before-commit": {
    says: "the answer goes out while the transaction is still open",
    edits: [["db/scope.ts", `  return transact(connections(), async (tx) => {
    await tx.execute(sql\`select set_config('app.shop_id', \${shopId}, true)\`);
    return fn(tx);
  });`, `  const isDriven = !(process.argv[1] ?? "").endsWith("prepare.ts");
  if (!isDriven) {
    return transact(connections(), async (tx) => {
      await tx.execute(sql\`select set_config('app.shop_id', \${shopId}, true)\`);
      return fn(tx);
    });
  }
  return new Promise<T>((resolve, reject) => {
    transact(connections(), async (tx) => {
      await tx.execute(sql\`select set_config('app.shop_id', \${shopId}, true)\`);
      const value = await fn(tx);
      resolve(value);
      await new Promise((later) => setTimeout(later, 40));
      return value;
    }).catch(reject);
  });`]],
  },
  "no-idempotency": {
    says: "a repeat under the same key is done again",
    edits: [["modules/access/command.ts", "if (before) {", "if (before && inputHash === \"\") {"], ["modules/access/command.ts", "values({ shopId: ctx.shop.id, requestId, command: spec.name", "values({ shopId: ctx.shop.id, requestId: crypto.randomUUID(), command: spec.name"]],
  },
  "version-left-out": {
    says: "an edit does not look at the version it was made on",
    edits: [["modules/customers/commands.ts", "where(and(at, eq(customers.version, version)))", "where(at)"], ["modules/customers/commands.ts", "version: sql`${customers.version} + 1`", "version: version + 1"]],
  },
  "audit-outside": {
    says: "the row of the trail is written in a transaction of its own",
    edits: [["modules/access/command.ts", "await writeAudit(ctx, {", "await withShop(ctx.shop.id, (tx) => writeAudit({ ...ctx, tx }, {"], ["modules/access/command.ts", "detail: { input: without(input, spec.secret), value } });", "detail: { input: without(input, spec.secret), value } }));\n    await new Promise((later) => setTimeout(later, 60));"]],
  },
};

const LEFT_OUT = new Set(["node_modules", ".next", ".data", ".test", ".git", "test-results", "coverage"]);

/** The project's sources in a folder of their own, with the packages as hard links. */
function copyOfSources(folder) {
  fs.rmSync(folder, { recursive: true, force: true });
  fs.mkdirSync(folder, { recursive: true });
  for (const name of fs.readdirSync(PROJECT)) if (!LEFT_OUT.has(name)) fs.cpSync(path.join(PROJECT, name), path.join(folder, name), { recursive: true });
  const from = path.join(PROJECT, "node_modules");
  const to = path.join(folder, "node_modules");
  if (spawnSync("cp", ["-al", from, to]).status !== 0) {
    fs.rmSync(to, { recursive: true, force: true });
    fs.cpSync(from, to, { recursive: true, verbatimSymlinks: true });
  }
  // Its locks and stamps are the project's own.
  for (const stamp of [".valvekeeper-build", ".valvekeeper-lock"]) fs.rmSync(path.join(to, stamp), { force: true });
}

function edit(folder, [file, from, to]) {
  const full = path.join(folder, file);
  const text = fs.readFileSync(full, "utf8");
  if (text.split(from).length !== 2) throw new Problem(`${file} does not hold the place to plant in exactly once:\n${from}\nThe sources moved on: mend scripts/drill/plant.mjs.`);
  fs.writeFileSync(full, text.replace(from, () => to));
}

function runDrill(folder, args) {
  return new Promise((resolve, reject) => {
    const env = { ...process.env, VK_PG_ROOT: process.env.VK_PG_ROOT || PROJECT };
    const child = spawn(process.execPath, ["--conditions=react-server", "scripts/drill.mjs", ...args], { cwd: folder, env, stdio: ["ignore", "pipe", "inherit"] });
    let text = "";
    child.stdout.on("data", (chunk) => {
      text += chunk;
      process.stdout.write(chunk);
    });
    child.once("error", reject);
    child.once("close", (code) => resolve({ code, text }));
  });
}

/** Plants whose place is no longer in the sources exactly once, as `name: file`. */
export const misplaced = () => Object.entries(PLANTS).flatMap(([name, { edits }]) => edits
  .filter(([file, from]) => fs.readFileSync(path.join(PROJECT, file), "utf8").split(from).length !== 2).map(([file]) => `${name}: ${file}`));

/** Runs the drill on a planted mistake. @returns whether the drill found it */
export async function planted({ plant, commands, kills, seed, fromSources }) {
  const names = plant === "all" ? Object.keys(PLANTS) : [plant];
  const missed = [];
  for (const name of names) {
    const one = PLANTS[name];
    if (!one) throw new Problem(`There is no plant "${name}". There are: ${Object.keys(PLANTS).join(", ")}, or all.`);
    heading(`Planting ${name}: ${one.says}`);
    const folder = path.join(os.tmpdir(), `valvekeeper-planted-${name}`);
    copyOfSources(folder);
    for (const change of one.edits) edit(folder, change);
    const { code, text } = await runDrill(folder, ["--commands", String(commands), "--kills", String(kills), "--seed", String(seed), ...(fromSources ? ["--from-sources"] : [])]);
    // It must have come to its verdict: a drill that broke down has found nothing.
    const found = code === 1 && /What the drill has shown/.test(text) && /FAULTS/.test(text);
    say(found ? `${name}: found` : `${name}: NOT FOUND`);
    if (!found) missed.push(name);
    fs.rmSync(folder, { recursive: true, force: true });
  }
  say(`Planted ${names.length}, found ${names.length - missed.length}${missed.length ? `; missed: ${missed.join(", ")}` : ""}`);
  return missed.length === 0;
}
