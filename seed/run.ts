import { mkdir, writeFile } from "node:fs/promises";
import path from "node:path";
import { closeDatabase } from "@/db/client";
import { env } from "@/modules/access/env";
import { DEMO_PASSWORD, NINEBARK } from "./facts/ninebark";
import { TAMARACK } from "./facts/tamarack";
import { tellNinebark } from "./story/ninebark";
import { tellTamarack } from "./story/tamarack";

/** Tells the two demo shops into an empty database, through the product's own commands, and writes down who may sign in. */
const { VK_OWNER_URL, VK_SIGN_INS_FILE } = process.env;
if (!VK_OWNER_URL) throw new Error("VK_OWNER_URL is not set: shops are founded by the owner of the database.");
const pepper = env().VK_PIN_PEPPER;
const now = new Date();

console.log("Ninebark Headworks");
await tellNinebark(VK_OWNER_URL, pepper, now, (line) => console.log(line));
console.log("Tamarack Bench & Valve");
await tellTamarack(VK_OWNER_URL, pepper, now);

if (VK_SIGN_INS_FILE) {
  const rows = [NINEBARK, TAMARACK].flatMap((shop) => shop.people.filter((p) => p.email).map((p) => ({ shop: shop.name, role: p.roles.join(", "), email: p.email, password: DEMO_PASSWORD, badge: p.badge, pin: p.pin })));
  await mkdir(path.dirname(VK_SIGN_INS_FILE), { recursive: true });
  await writeFile(VK_SIGN_INS_FILE, `${JSON.stringify(rows, null, 2)}\n`, { mode: 0o600 });
}
await closeDatabase();
