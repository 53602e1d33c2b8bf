/** `npm run web`: one web process of the built server. Its settings come from the environment, and it names what is missing. */
import fs from "node:fs";
import path from "node:path";
import { pathToFileURL } from "node:url";
import { DATA_FOLDER } from "./installation.mjs";
import { portFrom } from "./ports.mjs";
import { Problem, run } from "./say.mjs";

await run(async () => {
  const server = path.join(DATA_FOLDER, "server", "server.js");
  if (!fs.existsSync(server)) throw new Problem("There is no built server yet: npm run build makes it.");
  process.env.NODE_ENV = "production";
  process.env.PORT = String(portFrom("VK_PORT", 3000));
  process.env.HOSTNAME = process.env.VK_HOST || "0.0.0.0";
  process.chdir(path.dirname(server));
  await import(pathToFileURL(server).href);
});
