/**
 * Founds a shop with its owner and prints a link at which the owner sets a password. There is no default account.
 *
 *   npm run shop:found -- --slug ninebark --name "Ninebark Headworks" --zone America/Denver --currency USD --locale en-US \
 *     --owner "Marit Okafor" --email marit@ninebark.example
 *   npm run shop:found -- --again ninebark       another link, when the first one ran out
 *
 * The link works once and for three days. An outside database is named by VK_OWNER_URL and VK_DATABASE_URL.
 */
import { openInstallation, runHere } from "./installation.mjs";
import { Problem, run } from "./say.mjs";

const OPTIONS = ["slug", "name", "zone", "currency", "locale", "owner", "email"];
const USAGE = `Usage: npm run shop:found -- ${OPTIONS.map((o) => `--${o} …`).join(" ")}
  --slug      short name in addresses: lower-case letters, digits and dashes
  --name      name on papers
  --zone      time zone, such as America/Denver
  --currency  three letters, such as USD
  --locale    how dates and numbers are written, such as en-US
  --owner     name of the owner
  --email     address the owner signs in with
Or, for another link to a shop whose owner has no password yet: npm run shop:found -- --again SLUG`;

function given(argv) {
  if (argv.length === 0 || argv.includes("--help")) throw new Problem(USAGE);
  const found = {};
  for (let i = 0; i < argv.length; i += 2) {
    const name = argv[i].replace(/^--/, "");
    if (![...OPTIONS, "again"].includes(name) || argv[i + 1] === undefined) throw new Problem(`${argv[i]} is not understood.\n${USAGE}`);
    found[name] = argv[i + 1];
  }
  const missing = found.again ? [] : OPTIONS.filter((o) => !found[o]);
  if (missing.length > 0) throw new Problem(`${missing.map((m) => `--${m}`).join(", ")} ${missing.length > 1 ? "are" : "is"} missing.\n${USAGE}`);
  return found;
}

await run(async () => {
  const shop = given(process.argv.slice(2));
  const here = await openInstallation(process.env.VK_OWNER_URL ? ["VK_OWNER_URL", "VK_DATABASE_URL"] : []);
  try {
    runHere("scripts/found/run.ts", { ...here.env, FOUND_SHOP: JSON.stringify(shop) }, [], "No shop was founded.");
  } finally {
    here.close();
  }
});
