import type { Answer, Call } from "../shared/http";
import { json } from "../shared/http";
import { formOf, listOf, readForm, textOf, textsOf, type Form } from "./form";
import { expanded, pageOf } from "./listing";
import type { Provider } from "./provider";
import { invalid, noSuch, Refusal } from "./refusal";

export interface ApiConfig {
  readonly secretKey: string;
  readonly apiVersion: string;
}

function wholeNumber(text: string | null, param: string): number | null {
  if (text === null) return null;
  if (!/^-?\d{1,12}$/.test(text)) throw invalid(`Invalid integer: ${text}`, param, "parameter_invalid_integer");
  return Number(text);
}

function required(value: string | null, param: string): string {
  if (value === null) throw invalid(`Missing required param: ${param}.`, param, "parameter_missing");
  return value;
}

function address(text: string | null, param: string): string | null {
  if (text === null) return null;
  if (!/^https?:\/\/[^\s]+$/.test(text)) throw invalid("Not a valid URL", param, "url_invalid");
  return text;
}

/** The first and only line: this stand-in knows one line of `price_data` a session. */
function lineOf(form: Form): { amount: number; currency: string; description: string } {
  const lines = listOf(form, "line_items");
  const [line] = lines;
  if (lines.length !== 1 || typeof line !== "object" || Array.isArray(line)) throw invalid("One line item is supported here.", "line_items");
  const price = formOf(line, "price_data") ?? {};
  const quantity = wholeNumber(textOf(line, "quantity"), "line_items[0][quantity]") ?? 1;
  const unit = wholeNumber(required(textOf(price, "unit_amount"), "line_items[0][price_data][unit_amount]"), "line_items[0][price_data][unit_amount]") ?? 0;
  const currency = required(textOf(price, "currency"), "line_items[0][price_data][currency]");
  if (!/^[a-z]{3}$/.test(currency)) throw invalid(`Invalid currency: ${currency}`, "line_items[0][price_data][currency]");
  const name = required(textOf(formOf(price, "product_data") ?? {}, "name"), "line_items[0][price_data][product_data][name]");
  return { amount: unit * quantity, currency, description: name };
}

function createSession(provider: Provider, form: Form) {
  if (textOf(form, "mode") !== "payment") throw invalid("Only mode=payment is supported here.", "mode");
  const line = lineOf(form);
  const intent = formOf(form, "payment_intent_data");
  return provider.createSession({
    amount: line.amount, currency: line.currency, description: (intent && textOf(intent, "description")) ?? line.description,
    reference: textOf(form, "client_reference_id"), metadata: textsOf(formOf(form, "metadata")), intentMetadata: textsOf(intent && formOf(intent, "metadata")),
    email: textOf(form, "customer_email"), successUrl: required(address(textOf(form, "success_url"), "success_url"), "success_url"),
    cancelUrl: address(textOf(form, "cancel_url"), "cancel_url"), expiresAt: wholeNumber(textOf(form, "expires_at"), "expires_at"),
  });
}

function get(provider: Provider, path: readonly string[], query: URLSearchParams): object {
  const [a, b, c] = path;
  const { state } = provider;
  const one = <T extends { id: string }>(what: string, all: readonly T[], id: string): T => {
    const found = all.find((o) => o.id === id);
    if (found === undefined) throw noSuch(what, id);
    return found;
  };
  if (a === "checkout" && b === "sessions") {
    if (c !== undefined) return provider.session(c);
    const intent = query.get("payment_intent");
    return pageOf(state.sessions.filter((s) => intent === null || s.payment_intent === intent), query, "/v1/checkout/sessions");
  }
  if (a === "balance_transactions" && b === undefined) {
    const payout = query.get("payout");
    if (payout !== null) one("payout", state.payouts, payout);
    const type = query.get("type");
    return pageOf(state.balance.filter((t) => (payout === null || state.paidOut[t.id] === payout) && (type === null || t.type === type)), query, "/v1/balance_transactions");
  }
  if (a === "payment_intents" && b !== undefined) return provider.intent(b);
  const known: Record<string, readonly [string, readonly ({ id: string; created: number })[]]> = {
    payment_intents: ["payment_intent", state.intents], charges: ["charge", state.charges], refunds: ["refund", state.refunds], disputes: ["dispute", state.disputes],
    payouts: ["payout", state.payouts], events: ["event", state.events], balance_transactions: ["balance_transaction", state.balance],
  };
  const kind = known[a ?? ""];
  if (kind === undefined || c !== undefined) throw new Refusal(404, "invalid_request_error", `Unrecognized request URL (GET: /v1/${path.join("/")}).`);
  return b === undefined ? pageOf(kind[1], query, `/v1/${a ?? ""}`) : one(kind[0], kind[1], b);
}

function post(provider: Provider, path: readonly string[], form: Form, idempotencyKey: string | null): object {
  const [a, b, c, d] = path;
  if (a === "checkout" && b === "sessions" && c === undefined) return createSession(provider, form);
  if (a === "checkout" && b === "sessions" && c !== undefined && d === "expire") return provider.expireSession(c);
  if (a === "refunds" && b === undefined) {
    const charge = textOf(form, "charge");
    const paymentIntent = textOf(form, "payment_intent");
    if (charge === null && paymentIntent === null) throw invalid("One of the following params should be provided for this request: payment_intent or charge.");
    return provider.refund({ charge, paymentIntent }, wholeNumber(textOf(form, "amount"), "amount"), textsOf(formOf(form, "metadata")), { idempotencyKey });
  }
  throw new Refusal(404, "invalid_request_error", `Unrecognized request URL (POST: /v1/${path.join("/")}).`);
}

function authorise(call: Call, config: ApiConfig): void {
  if (call.headers.authorization !== `Bearer ${config.secretKey}`) throw new Refusal(401, "invalid_request_error", "Invalid API Key provided.");
  const version = call.headers["stripe-version"];
  if (version !== config.apiVersion) throw invalid(`This stand-in speaks API version ${config.apiVersion}, not ${String(version)}.`);
}

/** One call of the provider's API. Answers under an idempotency key are kept and given again. */
export function answerApi(provider: Provider, config: ApiConfig, call: Call): Answer {
  const headers = { "request-id": `req_local${Date.now().toString(36)}`, "stripe-version": config.apiVersion };
  try {
    authorise(call, config);
    const path = call.url.pathname.split("/").filter(Boolean).slice(1);
    if (call.method === "GET") {
      const expand = [...call.url.searchParams].filter(([name]) => /^expand\[\d*\]$/.test(name)).map(([, value]) => value);
      return json(expanded(get(provider, path, call.url.searchParams), expand, (id) => provider.find(id)), 200, headers);
    }
    if (call.method !== "POST") throw new Refusal(405, "invalid_request_error", `Method ${call.method} is not known here.`);
    const body = call.body.toString("utf8");
    const header = call.headers["idempotency-key"];
    const key = typeof header === "string" && header !== "" ? header : null;
    const asked = `${call.url.pathname}\n${body}`;
    const kept = key === null ? undefined : provider.state.answers[key];
    if (kept !== undefined) {
      if (kept.asked !== asked) {
        throw new Refusal(400, "idempotency_error", "Keys for idempotent requests can only be used with the same parameters they were first used with.", "idempotency_key_in_use");
      }
      return { status: kept.status, headers: { "content-type": "application/json", "idempotent-replayed": "true", ...headers }, body: kept.body };
    }
    const form = readForm(body);
    const expand = listOf(form, "expand").filter((e): e is string => typeof e === "string");
    const answer = json(expanded(post(provider, path, form, key), expand, (id) => provider.find(id)), 200, headers);
    if (key !== null) provider.remember(key, { asked, status: answer.status, body: String(answer.body) });
    return answer;
  } catch (error) {
    if (error instanceof Refusal) return json(error.body(), error.status, headers);
    throw error;
  }
}
