/** What the commands print while they work, and how they refuse. */

/** A problem that the reader can do something about: printed without a stack. */
export class Problem extends Error {}

const started = Date.now();

export function say(text) {
  const seconds = ((Date.now() - started) / 1000).toFixed(1).padStart(6);
  console.log(`${seconds} s  ${text}`);
}

export function heading(text) {
  console.log(`\n── ${text} ${"─".repeat(Math.max(0, 72 - text.length))}`);
}

/** Run `main` and turn what it throws into one clear message and an exit code. */
export async function run(main) {
  try {
    await main();
  } catch (error) {
    if (error instanceof Problem) console.error(`\n${error.message}\n`);
    else console.error(error);
    process.exitCode = 1;
  }
}
