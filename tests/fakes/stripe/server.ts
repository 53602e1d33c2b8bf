import { listen, page, redirect } from "../shared/http";
import { answerApi } from "./api";
import { answerCheckout } from "./checkout";
import { answerControl } from "./control";
import { ApiFaults } from "./faults";
import { bookPage } from "./pages";
import { Provider } from "./provider";
import { Refusal } from "./refusal";
import { Keeper, type Fee } from "./state";
import { Webhooks } from "./webhooks";

export interface PaymentsConfig {
  readonly port: number;
  /** Null: everything in memory. */
  readonly file: string | null;
  readonly secretKey: string;
  readonly webhookSecret: string;
  readonly webhookUrl: string;
  readonly now: () => Date;
  readonly fee?: Fee;
}

export interface PaymentsStandIn {
  readonly port: number;
  readonly url: string;
  readonly provider: Provider;
  readonly faults: ApiFaults;
  readonly webhooks: Webhooks;
  close(): Promise<void>;
}

/** The version that the SDK of this project speaks. */
const API_VERSION = "2026-10-28.endive";

const DEFAULT_FEE: Fee = { basisPoints: 270, fixedMinor: 25 };

/** The stand-in for the payment provider. Port 0 takes any free port. */
export async function startPayments(config: PaymentsConfig): Promise<PaymentsStandIn> {
  const keeper = new Keeper(config.file, config.fee ?? DEFAULT_FEE);
  const faults = new ApiFaults();
  const webhooks = new Webhooks(keeper, config.webhookUrl, config.webhookSecret);
  let url = "";
  const make = () => new Provider(keeper, config.now, url, API_VERSION, (event) => webhooks.send(event));
  let provider = make();
  const api = { secretKey: config.secretKey, apiVersion: API_VERSION };

  const server = await listen(async (call) => {
    const { pathname } = call.url;
    try {
      if (pathname.startsWith("/v1/")) return await faults.around(call, () => answerApi(provider, api, call));
      if (pathname.startsWith("/c/pay/")) return answerCheckout(provider, pathname.slice("/c/pay/".length), call, config.now());
      if (pathname === "/_control" || pathname.startsWith("/_control/")) {
        return await answerControl({ provider, faults, webhooks, clear: () => keeper.clear(), saved: () => keeper.save() }, call);
      }
      const form = new URLSearchParams(call.body.toString("utf8"));
      if (call.method === "POST" && pathname === "/payout") provider.payout(form.get("currency") ?? "usd", null);
      else if (call.method === "POST" && pathname === "/settle") provider.settle(form.get("session") ?? "", form.get("outcome") === "succeeded");
      else if (pathname === "/") {
        provider.expireOverdue();
        const onBalance = new Set(keeper.state.balance.filter((b) => b.type !== "payout" && keeper.state.paidOut[b.id] === undefined).map((b) => b.currency));
        return page(bookPage(keeper.state, [...onBalance].sort()));
      } else return page("<!doctype html><title>Not here</title><p>There is nothing at this address.", 404);
      return redirect("/");
    } catch (error) {
      if (error instanceof Refusal) return page(`<!doctype html><html lang="en"><title>Not possible</title><p>${error.message}</p><p><a href="/">Back</a></p></html>`, error.status);
      throw error;
    }
  }, config.port);
  url = `http://localhost:${server.port}`;
  provider = make();
  webhooks.resume();
  const overdue = setInterval(() => provider.expireOverdue(), 5000);
  overdue.unref();

  return {
    port: server.port,
    url,
    get provider() {
      return provider;
    },
    faults,
    webhooks,
    close: async () => {
      clearInterval(overdue);
      webhooks.close();
      await server.close();
      keeper.flush();
    },
  };
}
