import { clockFrom } from "../shared/clock";
import { startPayments } from "./server";

const { FAKE_PAY_PORT, FAKE_PAY_FILE, FAKE_PAY_SECRET_KEY, FAKE_PAY_WEBHOOK_SECRET, FAKE_PAY_WEBHOOK_URL, VK_CLOCK_FILE } = process.env;
if (!FAKE_PAY_PORT || !FAKE_PAY_FILE || !FAKE_PAY_SECRET_KEY || !FAKE_PAY_WEBHOOK_SECRET || !FAKE_PAY_WEBHOOK_URL) {
  throw new Error("FAKE_PAY_PORT, FAKE_PAY_FILE, FAKE_PAY_SECRET_KEY, FAKE_PAY_WEBHOOK_SECRET and FAKE_PAY_WEBHOOK_URL must be set.");
}

const payments = await startPayments({
  port: Number(FAKE_PAY_PORT), file: FAKE_PAY_FILE, secretKey: FAKE_PAY_SECRET_KEY, webhookSecret: FAKE_PAY_WEBHOOK_SECRET, webhookUrl: FAKE_PAY_WEBHOOK_URL,
  now: clockFrom(VK_CLOCK_FILE),
});
console.log(`local test payment provider on ${payments.url}`);
for (const signal of ["SIGINT", "SIGTERM"] as const) process.once(signal, () => void payments.close().then(() => process.exit(0)));
