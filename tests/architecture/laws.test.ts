import { spawnSync } from "node:child_process";
import path from "node:path";
import { expect, it } from "vitest";
import { ROOT } from "./sources";

const cruise = (...more: string[]) => spawnSync(process.execPath, [path.join(ROOT, "node_modules/dependency-cruiser/bin/dependency-cruise.mjs"), ...more], { cwd: ROOT, encoding: "utf8", maxBuffer: 64 * 1024 * 1024 });

it("every import keeps the laws of the house", () => {
  const { status, stdout, stderr } = cruise("app", "modules", "db", "seed", "worker", "scripts", "tests");
  expect(`${stdout}${stderr}`).toMatch(/dependencies cruised/);
  expect(status === 0 ? "" : stdout).toBe("");
}, 180_000);
