import { mkdtempSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { testDatabase } from "./database";

/** Before each integration test file: its own database, and settings that lead nowhere outside this machine. */
Object.assign(process.env, {
  VK_APP_URL: "http://localhost:3999",
  NEXTAUTH_URL: "http://localhost:3999",
  NEXTAUTH_SECRET: "a secret for tests, long enough to pass for one",
  VK_PIN_PEPPER: "a pepper for tests, long enough to pass for one",
  // Port 9 (discard) refuses: a test that needs a stand-in starts its own and sets these before the first use.
  STRIPE_SECRET_KEY: "sk_test_nobody",
  STRIPE_WEBHOOK_SECRET: "whsec_test",
  STRIPE_API_BASE: "http://127.0.0.1:9",
  SMTP_URL: "smtp://127.0.0.1:9",
  VK_MAIL_FROM: "shop@valvekeeper.example",
  VK_FILES_DIR: mkdtempSync(path.join(tmpdir(), "vk-files-")),
});
delete process.env.VK_CLOCK_FILE;

await testDatabase();
