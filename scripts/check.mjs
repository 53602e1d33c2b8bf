/** `npm run check`: what can be checked without a database or a browser, each part shown as it ends. */
import { spawnSync } from "node:child_process";
import { PROJECT } from "./environment.mjs";
import { heading, run, say } from "./say.mjs";

const PARTS = [
  ["Types", ["npm", "run", "--silent", "typecheck"]],
  ["Lint", ["npm", "run", "--silent", "lint"]],
  ["Laws of import", ["npm", "run", "--silent", "laws"]],
  ["Unused code", ["npm", "run", "--silent", "knip"]],
  ["Unit tests", ["npx", "vitest", "run", "--project", "unit", "--project", "architecture", "--project", "checks", "--exclude", "**/*.int.test.ts"]],
];

await run(async () => {
  const failed = [];
  for (const [name, [program, ...args]] of PARTS) {
    heading(name);
    const { status } = spawnSync(program, args, { cwd: PROJECT, stdio: "inherit", env: { ...process.env, NEXT_TELEMETRY_DISABLED: "1" } });
    say(`${name}: ${status === 0 ? "passed" : "FAILED"}`);
    if (status !== 0) failed.push(name);
  }
  if (failed.length > 0) {
    console.log(`\nNot passed: ${failed.join(", ")}`);
    process.exitCode = 1;
  }
});
