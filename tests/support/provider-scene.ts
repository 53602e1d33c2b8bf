import { mkdtempSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { receiveEvent } from "@/modules/payments/events";
import { listen } from "@/tests/fakes/shared/http";
import { startPayments, type PaymentsStandIn } from "@/tests/fakes/stripe/server";
import { handlers } from "@/worker/handlers";
import { drain } from "@/worker/queue";
import { currentDatabase } from "./database";

const card = { email: "odalys@brennan.example", number: "4242 4242 4242 4242", expiry: "12/34", cvc: "123", name: "Odalys Brennan", way: "card" };

/** The payment provider's stand-in, its webhook into the application, the worker, and one clock for all three. */
export interface ProviderScene {
  readonly fake: PaymentsStandIn;
  setClock(at: string): void;
  control(what: string, input?: unknown): Promise<unknown>;
  /** Pays the page of a session with a good card. */
  payPage(session: string): Promise<Response>;
  /** How many webhook calls were answered so far. */
  events(): number;
  until(fits: () => boolean | Promise<boolean>, what: string): Promise<void>;
  /** The worker's turn, as the worker's role. */
  work(): Promise<void>;
  /** Does something at the provider, waits for as many events and lets the worker settle them. */
  told(events: number, act: () => Promise<unknown>): Promise<void>;
  close(): Promise<void>;
}

export async function openProviderScene(): Promise<ProviderScene> {
  let clock = new Date(0);
  let answered = 0;
  const clockFile = path.join(mkdtempSync(path.join(tmpdir(), "vk-clock-")), "now");
  const hook = await listen(async (call) => {
    const header = call.headers["stripe-signature"];
    const status = await receiveEvent(call.body, typeof header === "string" ? header : null);
    answered += 1;
    return { status };
  }, 0);
  const fake = await startPayments({ port: 0, file: null, secretKey: "sk_test_money", webhookSecret: "whsec_money", webhookUrl: `http://127.0.0.1:${hook.port}/`, now: () => clock });
  Object.assign(process.env, { VK_CLOCK_FILE: clockFile, STRIPE_SECRET_KEY: "sk_test_money", STRIPE_WEBHOOK_SECRET: "whsec_money", STRIPE_API_BASE: fake.url });
  const scene: ProviderScene = {
    fake,
    setClock: (at) => { clock = new Date(at); writeFileSync(clockFile, at); },
    control: async (what, input = {}) => {
      const answer = await fetch(`${fake.url}/_control/${what}`, { method: "POST", body: JSON.stringify(input) });
      if (!answer.ok) throw new Error(`${what}: ${answer.status} ${await answer.text()}`);
      return (await answer.json()) as unknown;
    },
    payPage: (session) => fetch(`${fake.url}/c/pay/${session}`, { method: "POST", body: new URLSearchParams(card), redirect: "manual" }),
    events: () => answered,
    until: async (fits, what) => {
      const end = Date.now() + 8000;
      while (!(await fits())) {
        if (Date.now() > end) throw new Error(`waited in vain: ${what}`);
        await new Promise((resolve) => setTimeout(resolve, 20));
      }
    },
    work: async () => {
      const { appUrl, jobUrl } = currentDatabase();
      process.env.VK_DATABASE_URL = jobUrl;
      try {
        await drain({ ...handlers, "mail.send": async () => undefined });
      } finally {
        process.env.VK_DATABASE_URL = appUrl;
      }
    },
    told: async (n, act) => {
      const before = answered;
      await act();
      await scene.until(() => answered >= before + n, `${n} events`);
      await scene.work();
    },
    close: async () => { await fake.close(); await hook.close(); },
  };
  return scene;
}
