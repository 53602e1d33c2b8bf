/** `npm run build`: the server that `npm run web` runs, built when the sources changed. */
import { ensurePackages, ensureServer } from "./prepare.mjs";
import { DATA_FOLDER } from "./installation.mjs";
import { run, say } from "./say.mjs";

await run(async () => {
  await ensurePackages();
  say(`The built server is in ${await ensureServer(DATA_FOLDER)}`);
});
