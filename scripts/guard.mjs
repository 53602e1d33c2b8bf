/**
 * Outlives the command that started it for a moment: when that command is gone without having said so (killed
 * hard, terminal closed), it stops what the command left running. It learns process groups and the database
 * from lines on its standard input, and acts when that input ends.
 */
import { createInterface } from "node:readline";
import { stopCluster } from "./postgres.mjs";

const groups = new Set();
let place = null;

for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.on(signal, () => {});

const lines = createInterface({ input: process.stdin });
lines.on("line", (line) => {
  const message = JSON.parse(line);
  if (message.done) process.exit(0);
  if (message.add) groups.add(message.add);
  if (message.remove) groups.delete(message.remove);
  if (message.cluster) place = message.cluster;
});

const signalAll = (signal) => {
  for (const group of groups) {
    try {
      process.kill(-group, signal);
    } catch {
      groups.delete(group);
    }
  }
};

lines.on("close", () => {
  signalAll("SIGTERM");
  let left = 20;
  const timer = setInterval(() => {
    left -= 1;
    signalAll(left > 0 ? 0 : "SIGKILL");
    if (groups.size > 0 && left > 0) return;
    clearInterval(timer);
    if (place !== null) stopCluster(place);
    process.exit(0);
  }, 250);
});
