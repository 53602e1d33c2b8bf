import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { assemble, databaseUrls, loadSecrets, outsideServices, portsFor, standInEnvironment } from "./environment.mjs";

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), "env-"));
});
afterEach(() => rmSync(folder, { recursive: true }));

const ports = { web: 3000, mail: 2525, inbox: 3025, pay: 3030 };
const assembled = (environment: Record<string, string> = {}) => {
  const secrets = loadSecrets(folder);
  return assemble({ folder, ports, secrets, database: databaseUrls({ port: 54329 }, secrets, "valvekeeper"), environment });
};

describe("the secrets of an installation", () => {
  it("are made once, differ, and are for the owner's eyes only", () => {
    const first = loadSecrets(folder);
    expect(loadSecrets(folder)).toEqual(first);
    expect(new Set(Object.values(first)).size).toBe(Object.values(first).length);
    expect(first.sessionSecret.length).toBeGreaterThanOrEqual(32);
    expect(first.pinPepper.length).toBeGreaterThanOrEqual(32);
    expect(statSync(path.join(folder, "secrets.json")).mode & 0o077).toBe(0);
  });
  it("keep what is there when one is added, and are not replaced when they can't be read", () => {
    const file = path.join(folder, "secrets.json");
    writeFileSync(file, JSON.stringify({ pinPepper: "kept" }));
    expect(loadSecrets(folder).pinPepper).toBe("kept");
    writeFileSync(file, "{");
    expect(() => loadSecrets(folder)).toThrow("backup");
    expect(readFileSync(file, "utf8")).toBe("{");
  });
});

describe("the environment of the processes", () => {
  it("gives each process its own way into the database and no other", () => {
    const { env, workerEnv, ownerEnv } = assembled({ VK_OWNER_URL: "x", VK_DATABASE_URL: "x", VK_JOB_DATABASE_URL: "x", PATH: "/bin", npm_config_x: "y" });
    expect(env.VK_DATABASE_URL).toContain("vk_app:");
    expect(workerEnv.VK_DATABASE_URL).toContain("vk_job:");
    expect(ownerEnv.VK_OWNER_URL).toContain("vk_owner:");
    for (const e of [env, workerEnv]) expect(JSON.stringify(e)).not.toMatch(/vk_owner|vk_backup|npm_config/);
    expect(JSON.stringify(env)).not.toContain("vk_job");
    expect(env.PATH).toBe("/bin");
  });
  it("points at the stand-ins when no real service is named", () => {
    const { env, local } = assembled();
    expect(env).toMatchObject({ STRIPE_API_BASE: "http://127.0.0.1:3030", SMTP_URL: "smtp://127.0.0.1:2525", VK_APP_URL: "http://localhost:3000", NEXTAUTH_URL: "http://localhost:3000" });
    expect(local).toEqual({ database: true, mail: true, payments: true });
    expect(env.VK_CLOCK_FILE).toBeUndefined();
  });
  it("names the folder of files by its whole path, whatever folder a process runs in", () => {
    expect(assembled().env.VK_FILES_DIR).toBe(path.resolve(folder, "files"));
    expect(assembled({ VK_FILES_DIR: "our/files" }).env.VK_FILES_DIR).toBe(path.resolve("our/files"));
  });
  it("points at real services where they are named, and starts no stand-in for them", () => {
    const real = { STRIPE_SECRET_KEY: "sk_live_x", STRIPE_WEBHOOK_SECRET: "whsec_x", SMTP_URL: "smtps://mail.example", VK_MAIL_FROM: "shop@heads.example", S3_BUCKET: "b", S3_REGION: "r", S3_ACCESS_KEY_ID: "k", S3_SECRET_ACCESS_KEY: "s" };
    const { env, local } = assembled(real);
    expect(env).toMatchObject(real);
    expect(env.STRIPE_API_BASE).toBeUndefined();
    expect(env.VK_FILES_DIR).toBeUndefined();
    expect(local).toMatchObject({ mail: false, payments: false });
  });
  it.each([
    [{ STRIPE_SECRET_KEY: "sk_live_x" }, "STRIPE_WEBHOOK_SECRET is missing"],
    [{ SMTP_URL: "smtps://x" }, "VK_MAIL_FROM is missing"],
    [{ VK_DATABASE_URL: "postgres://x" }, "VK_OWNER_URL and VK_JOB_DATABASE_URL are missing"],
    [{ S3_BUCKET: "b", S3_REGION: "r" }, "S3_ACCESS_KEY_ID and S3_SECRET_ACCESS_KEY are missing"],
  ])("refuses half a set of settings: %j", (environment, message) => {
    expect(() => outsideServices(environment)).toThrow(message);
  });
  it.each(["0", "70000", "http", "3000.5"])("refuses the port %j and names its variable", (text) => {
    expect(() => portsFor("product", { VK_PORT: text })).toThrow(`VK_PORT is "${text}"`);
  });
  it("tells the stand-ins nothing of the database", () => {
    const told = standInEnvironment({ folder, ports, secrets: loadSecrets(folder), appUrl: "http://localhost:3000" });
    expect(JSON.stringify(told)).not.toMatch(/postgres:|VK_DATABASE|pepper/i);
    expect(told.FAKE_PAY_WEBHOOK_URL).toBe("http://localhost:3000/api/stripe/webhook");
  });
});
