import { setTimeout as sleep } from "node:timers/promises";
import { closeDatabase } from "@/db/client";
import { env } from "@/modules/access/env";
import { logFault } from "@/modules/access/fault";
import { handlers } from "./handlers";
import { leaseJob, runJob } from "./queue";
import { runDue } from "./schedule";

env();
let stopping = false;
for (const signal of ["SIGTERM", "SIGINT"] as const) process.on(signal, () => { stopping = true; });

console.log(JSON.stringify({ at: new Date().toISOString(), event: "worker-ready" }));
while (!stopping) {
  try {
    const job = await leaseJob();
    if (job) await runJob(job, handlers);
    else {
      await runDue(Date.now());
      await sleep(400);
    }
  } catch (error) {
    logFault("worker", error);
    await sleep(1000);
  }
}
await closeDatabase();
