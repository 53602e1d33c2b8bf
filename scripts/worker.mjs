/** `npm run worker`: one worker process. It opens the database as vk_job: by VK_JOB_DATABASE_URL, or VK_DATABASE_URL where only that is set. */
import { register } from "tsx/esm/api";

process.env.NODE_ENV ??= "production";
if (process.env.VK_JOB_DATABASE_URL) process.env.VK_DATABASE_URL = process.env.VK_JOB_DATABASE_URL;
register();
await import("../worker/run.ts");
