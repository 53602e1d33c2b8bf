/** `npm start`: everything from an empty machine to a running product, and nothing twice. */
import path from "node:path";
import { assemble, loadSecrets, outsideServices, databaseUrls, PORTS, portsFor, PROJECT, standInEnvironment } from "./environment.mjs";
import { demoWanted, markDemo, migrate, openDatabase, seedDemo } from "./database.mjs";
import { clusterPlace, startCluster } from "./postgres.mjs";
import { mustBeFree } from "./ports.mjs";
import { ensurePackages, ensureServer } from "./prepare.mjs";
import { heading, run, say } from "./say.mjs";
import { askedToStop, supervisor } from "./supervise.mjs";
import { signInLines } from "./sign-ins.mjs";

const FOLDER = path.join(PROJECT, ".data");
const DATABASE = "valvekeeper";

async function checkPorts(ports, outside, host) {
  const wanted = [["web", "the web application"], ...(outside.mail ? [] : [["mail", "the local mail server"], ["inbox", "the local inbox"]]), ...(outside.payments ? [] : [["pay", "the local payment provider"]])];
  for (const [name, what] of wanted) await mustBeFree(ports[name], PORTS.product[name][0], what, name === "web" ? host : undefined);
}

await run(async () => {
  const stopAsked = askedToStop();
  const ports = portsFor("product");
  const outside = outsideServices();
  const host = process.env.VK_HOST || "127.0.0.1";
  await checkPorts(ports, outside, host);
  await ensurePackages();

  const secrets = loadSecrets(FOLDER);
  const supervised = supervisor({ logs: path.join(FOLDER, "logs") });
  const stop = async () => {
    await supervised.stop();
    process.exit(process.exitCode ?? 0);
  };
  void stopAsked.then(async (why) => {
    console.log("");
    say(`Stopping (${why})`);
    await stop();
  });

  try {
    const place = clusterPlace("product");
    let database;
    if (!outside.database) {
      supervised.adoptCluster(place);
      database = databaseUrls(await openDatabase(place, secrets, DATABASE), secrets, DATABASE);
    }
    const { env, workerEnv, ownerEnv, local, addresses } = assemble({ folder: FOLDER, ports, secrets, database });

    // The stand-ins first: the demo is told through the product's own commands, which may send and charge.
    const standIns = standInEnvironment({ folder: FOLDER, ports, secrets, appUrl: addresses.app });
    if (local.mail) supervised.start("mail", { env: standIns });
    if (local.payments) supervised.start("payments", { env: standIns });
    await migrate(ownerEnv);
    if (local.mail) await supervised.waitFor("mail", addresses.inbox);
    if (local.payments) await supervised.waitFor("payments", addresses.payments);

    if (await demoWanted(ownerEnv, outside.database)) {
      say("Loading the demo shop");
      await seedDemo(ownerEnv);
      await markDemo(ownerEnv, "loaded");
    }
    const server = await ensureServer(FOLDER);
    supervised.start("web", { server, env: { ...env, PORT: String(ports.web), HOSTNAME: host } });
    supervised.start("worker", { env: workerEnv });
    await supervised.waitFor("web", `http://${host === "0.0.0.0" ? "127.0.0.1" : host}:${ports.web}/api/health`);

    heading("Valvekeeper is running");
    console.log(`  Application        ${addresses.app}`);
    if (local.mail) console.log(`  Local inbox        ${addresses.inbox}   (mail that the shop sends arrives here)`);
    if (local.payments) console.log(`  Local payments     ${addresses.payments}   (test cards; no money moves)`);
    for (const line of signInLines(env.VK_SIGN_INS_FILE)) console.log(`  ${line}`);
    console.log(`\n  Logs in ${path.relative(process.cwd(), path.join(FOLDER, "logs"))}. Ctrl-C stops everything.\n`);
    say("Ready");
    // Stays until asked to stop, and brings the database back should it be killed.
    setInterval(() => {}, 2 ** 30);
    if (!outside.database) supervised.keepCluster(() => startCluster(place));
  } catch (error) {
    await supervised.stop();
    throw error;
  }
});
