/**
 * The one place where the processes of the product get their environment: `npm start`, the tests, the drill and the
 * benchmark all assemble it here, so that none can differ by accident.
 */
import { randomBytes } from "node:crypto";
import fs from "node:fs";
import path from "node:path";
import { databaseUrl } from "./postgres.mjs";
import { portFrom } from "./ports.mjs";
import { Problem } from "./say.mjs";

export const PROJECT = path.resolve(import.meta.dirname, "..");

/** Ports by purpose: variable and default, of the product and of the tests beside it. */
export const PORTS = {
  product: { web: ["VK_PORT", 3000], mail: ["VK_MAIL_PORT", 2525], inbox: ["VK_INBOX_PORT", 3025], pay: ["VK_PAY_PORT", 3030] },
  test: { web: ["VK_TEST_PORT", 3100], mail: ["VK_TEST_MAIL_PORT", 2625], inbox: ["VK_TEST_INBOX_PORT", 3125], pay: ["VK_TEST_PAY_PORT", 3130] },
};

export function portsFor(kind, environment = process.env) {
  return Object.fromEntries(Object.entries(PORTS[kind]).map(([name, [variable, fallback]]) => [name, portFrom(variable, fallback, environment)]));
}

const secret = (bytes = 24) => randomBytes(bytes).toString("base64url");

/** Passwords and keys of this installation, made once, readable by its owner only. */
export function loadSecrets(folder) {
  const file = path.join(folder, "secrets.json");
  fs.mkdirSync(folder, { recursive: true });
  let kept = {};
  if (fs.existsSync(file)) {
    try {
      kept = JSON.parse(fs.readFileSync(file, "utf8"));
    } catch {
      throw new Problem(`${file} can't be read as JSON. Bring it back from a backup: sign-ins and PINs depend on it.`);
    }
  }
  const whole = {
    ownerPassword: secret(), appPassword: secret(), jobPassword: secret(), backupPassword: secret(),
    sessionSecret: secret(32), pinPepper: secret(32),
    paymentKey: `sk_test_local${randomBytes(12).toString("hex")}`, paymentWebhookSecret: `whsec_${randomBytes(24).toString("hex")}`,
    ...kept,
  };
  if (Object.keys(whole).length !== Object.keys(kept).length) {
    const half = `${file}.${process.pid}`;
    fs.writeFileSync(half, `${JSON.stringify(whole, null, 2)}\n`, { mode: 0o600 });
    fs.renameSync(half, file);
  }
  fs.chmodSync(file, 0o600);
  return whole;
}

/** Settings that belong together: all of them or none. */
function together(environment, names, why) {
  const given = names.filter((name) => environment[name]);
  if (given.length === 0) return false;
  const missing = names.filter((name) => !environment[name]);
  if (missing.length > 0) throw new Problem(`${given.join(" and ")} ${given.length > 1 ? "are" : "is"} set, but ${missing.join(" and ")} ${missing.length > 1 ? "are" : "is"} missing: ${why}`);
  return true;
}

/** Which outside services this environment names; what it does not name is served locally. */
export function outsideServices(environment = process.env) {
  return {
    database: together(environment, ["VK_OWNER_URL", "VK_DATABASE_URL", "VK_JOB_DATABASE_URL"], "an outside database needs the owner's, the web's and the worker's address."),
    payments: environment.STRIPE_API_BASE ? false : together(environment, ["STRIPE_SECRET_KEY", "STRIPE_WEBHOOK_SECRET"], "payments need the secret key and the signing secret of the webhook."),
    mail: Boolean(environment.SMTP_URL) && together(environment, ["SMTP_URL", "VK_MAIL_FROM"], "mail needs the server's address and the address to send from."),
    files: together(environment, ["S3_BUCKET", "S3_REGION", "S3_ACCESS_KEY_ID", "S3_SECRET_ACCESS_KEY"], "files in a bucket need its name, region and both keys."),
  };
}

/** The database addresses of a cluster of ours. */
export function databaseUrls(cluster, secrets, name) {
  return {
    VK_OWNER_URL: databaseUrl(cluster, "vk_owner", secrets.ownerPassword, name),
    VK_DATABASE_URL: databaseUrl(cluster, "vk_app", secrets.appPassword, name),
    VK_JOB_DATABASE_URL: databaseUrl(cluster, "vk_job", secrets.jobPassword, name),
    VK_BACKUP_URL: databaseUrl(cluster, "vk_backup", secrets.backupPassword, name),
  };
}

/** Ways into the database that only one kind of process may know. */
const OTHER_ROLES = new Set(["VK_OWNER_URL", "VK_BACKUP_URL", "VK_JOB_DATABASE_URL", "VK_APP_PASSWORD", "VK_JOB_PASSWORD", "VK_BACKUP_PASSWORD"]);

/** What a child needs of the surroundings. npm's own variables stay out. */
function surroundings(environment) {
  return Object.fromEntries(Object.entries(environment).filter(([name]) => !/^npm_/i.test(name) && !OTHER_ROLES.has(name)));
}

/**
 * The environment of web, worker and seed.
 * @param options `folder` of the data; `ports`; `secrets`; `database` addresses from `databaseUrls`, or none when they
 *   come from outside; `clockFile` for a test clock.
 * @returns `env` for the web, `workerEnv` for the worker, `ownerEnv` for migrator and seed (shops are founded by the
 *   owner of the tables); `local`: which stand-ins to serve; `addresses` for people
 */
export function assemble({ folder, ports, secrets, database, clockFile, environment = process.env }) {
  const outside = outsideServices(environment);
  const appUrl = (environment.VK_APP_URL || `http://localhost:${ports.web}`).replace(/\/+$/, "");
  const urls = database ?? environment;
  const env = {
    ...surroundings(environment),
    VK_DATABASE_URL: urls.VK_DATABASE_URL,
    NODE_ENV: "production",
    NEXT_TELEMETRY_DISABLED: "1",
    VK_APP_URL: appUrl,
    NEXTAUTH_URL: environment.NEXTAUTH_URL || appUrl,
    NEXTAUTH_SECRET: environment.NEXTAUTH_SECRET || secrets.sessionSecret,
    VK_PIN_PEPPER: environment.VK_PIN_PEPPER || secrets.pinPepper,
    VK_SIGN_INS_FILE: path.join(folder, "demo-sign-ins.json"),
    ...(outside.mail ? {} : { SMTP_URL: `smtp://127.0.0.1:${ports.mail}`, VK_MAIL_FROM: environment.VK_MAIL_FROM || "shop@valvekeeper.example" }),
    ...(outside.payments ? {} : {
      STRIPE_SECRET_KEY: secrets.paymentKey,
      STRIPE_WEBHOOK_SECRET: secrets.paymentWebhookSecret,
      STRIPE_API_BASE: `http://127.0.0.1:${ports.pay}`,
    }),
    ...(outside.files ? {} : { VK_FILES_DIR: path.resolve(environment.VK_FILES_DIR || path.join(folder, "files")) }),
    ...(clockFile === undefined ? {} : { VK_CLOCK_FILE: clockFile }),
  };
  return {
    env,
    // The same program code opens the database as another role: the worker may lease jobs over all shops.
    workerEnv: { ...env, VK_DATABASE_URL: urls.VK_JOB_DATABASE_URL },
    ownerEnv: { ...env, VK_OWNER_URL: urls.VK_OWNER_URL },
    local: { database: !outside.database, mail: !outside.mail, payments: !outside.payments },
    addresses: {
      app: appUrl,
      inbox: `http://localhost:${ports.inbox}`,
      payments: `http://localhost:${ports.pay}`,
    },
  };
}

/** The environment of the two stand-ins. They never see the database. */
export function standInEnvironment({ folder, ports, secrets, appUrl, clockFile }) {
  return {
    PATH: process.env.PATH, HOME: process.env.HOME, NODE_OPTIONS: process.env.NODE_OPTIONS ?? "",
    FAKE_MAIL_PORT: String(ports.mail),
    FAKE_INBOX_PORT: String(ports.inbox),
    FAKE_MAIL_FOLDER: path.join(folder, "mail"),
    FAKE_PAY_PORT: String(ports.pay),
    FAKE_PAY_FILE: path.join(folder, "payments.json"),
    FAKE_PAY_SECRET_KEY: secrets.paymentKey,
    FAKE_PAY_WEBHOOK_SECRET: secrets.paymentWebhookSecret,
    FAKE_PAY_WEBHOOK_URL: `${appUrl}/api/stripe/webhook`,
    ...(clockFile === undefined ? {} : { VK_CLOCK_FILE: clockFile }),
  };
}
