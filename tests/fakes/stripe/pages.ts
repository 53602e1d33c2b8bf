import type Stripe from "stripe";
import { escape, layout } from "../shared/look";
import { TEST_CARDS, type Typed } from "./cards";
import type { State } from "./state";

const frame = (title: string, main: string) =>
  layout({ title, name: "Local test payment provider", what: "A stand-in on this machine. No money moves; never type a real card.", main });

/** `1910.33 USD`. Currencies without or with three decimals follow ISO 4217. */
function amountText(minor: number, currency: string): string {
  const code = currency.toUpperCase();
  const decimals = /^(BIF|CLP|DJF|GNF|JPY|KMF|KRW|MGA|PYG|RWF|VND|VUV|XAF|XOF|XPF)$/.test(code) ? 0 : /^(BHD|JOD|KWD|OMR|TND)$/.test(code) ? 3 : 2;
  const sign = minor < 0 ? "-" : "";
  const digits = String(Math.abs(minor)).padStart(decimals + 1, "0");
  const whole = digits.slice(0, digits.length - decimals).replace(/\B(?=(\d{3})+$)/g, ",");
  return `${sign}${whole}${decimals > 0 ? `.${digits.slice(-decimals)}` : ""} ${code}`;
}

export interface Mistakes {
  readonly fields: Partial<Record<keyof Typed, string>>;
  readonly whole?: string;
}

function field(name: keyof Typed, label: string, typed: Typed, mistakes: Mistakes, more: string): string {
  const wrong = mistakes.fields[name];
  return `<label for="${name}">${label}</label><input id="${name}" name="${name}" value="${escape(typed[name])}" ${more} ${wrong ? `aria-invalid="true" aria-describedby="${name}-error"` : ""}>
${wrong ? `<p class="error" id="${name}-error">${escape(wrong)}</p>` : ""}`;
}

const what = (session: Stripe.Checkout.Session, description: string | null) =>
  `<h1>${escape(description ?? "Payment")}</h1><p class="big">${amountText(session.amount_total ?? 0, session.currency ?? "usd")}</p>`;

export function checkoutPage(session: Stripe.Checkout.Session, description: string | null, typed: Typed, mistakes: Mistakes): string {
  const cards = TEST_CARDS.map((card) => `<tr><td><code>${card.number}</code></td><td>${card.what}</td></tr>`).join("");
  const back = session.cancel_url === null ? "" : `<p><a href="${escape(session.cancel_url)}">Back without paying</a></p>`;
  return frame("Pay", `${back}${what(session, description)}
<form class="card" method="post" novalidate>${mistakes.whole ? `<p class="error" role="alert">${escape(mistakes.whole)}</p>` : ""}
${field("email", "E-mail", typed, mistakes, 'type="email" autocomplete="email"')}
${field("number", "Card number", typed, mistakes, 'inputmode="numeric" autocomplete="off" placeholder="4242 4242 4242 4242"')}
${field("expiry", "Expires (month / year)", typed, mistakes, 'inputmode="numeric" autocomplete="off" placeholder="12/34"')}
${field("cvc", "Security code", typed, mistakes, 'inputmode="numeric" autocomplete="off" placeholder="123"')}
${field("name", "Name on the card", typed, mistakes, 'autocomplete="off"')}
<p style="margin-top:20px"><button name="way" value="card">Pay ${amountText(session.amount_total ?? 0, session.currency ?? "usd")}</button></p>
<p><button class="second" name="way" value="debit">Pay by bank debit (the money comes later)</button></p></form>
<h2>Test cards</h2><table><thead><tr><th scope="col">Card number</th><th scope="col">What it does</th></tr></thead><tbody>${cards}</tbody></table>
<p>Any expiry to come and any three digits as security code.</p>`);
}

/** The bank's question for cards that ask for it. What was typed travels along. */
export function secondStepPage(session: Stripe.Checkout.Session, description: string | null, typed: Typed): string {
  const kept = (Object.entries(typed) as [string, string][]).map(([name, value]) => `<input type="hidden" name="${name}" value="${escape(value)}">`).join("");
  return frame("Confirm the payment", `${what(session, description)}<form class="card" method="post">${kept}<h2 style="margin-top:0">The bank of this card asks: is it you?</h2>
<p><button name="step" value="confirm">Confirm the payment</button></p><p><button class="second" name="step" value="refuse">Refuse</button></p></form>`);
}

export function overPage(session: Stripe.Checkout.Session, description: string | null, successUrl: string | null): string {
  const text = session.status === "expired" ? "This payment page has expired. Ask for a new link." : "This payment is complete. Nothing more will be charged.";
  return frame("Nothing to pay", `${what(session, description)}<p class="note">${text}</p>${session.status === "complete" && successUrl !== null ? `<p><a href="${escape(successUrl)}">Back to the shop</a></p>` : ""}`);
}

const when = (unixSeconds: number) => {
  const iso = new Date(unixSeconds * 1000).toISOString();
  return `<time datetime="${iso}">${iso.slice(0, 16).replace("T", " ")} UTC</time>`;
};

const table = (label: string, heads: readonly string[], rows: readonly string[]) =>
  rows.length === 0 ? '<p class="note">None yet.</p>'
    : `<div class="scroll" tabindex="0" role="region" aria-label="${label}"><table><thead><tr>${heads.map((h) => `<th scope="col">${h}</th>`).join("")}</tr></thead><tbody>${rows.join("")}</tbody></table></div>`;

/** Everything the stand-in knows, for people. */
export function bookPage(state: State, currencies: readonly string[]): string {
  const sessions = state.sessions.toReversed().map((s) => {
    const paying = s.status === "open" && s.url !== null ? `<a href="${escape(new URL(s.url).pathname)}">open</a>` : escape(s.status ?? "");
    const settle = s.status === "complete" && s.payment_status === "unpaid"
      ? `<form method="post" action="/settle"><input type="hidden" name="session" value="${s.id}"><button class="second" name="outcome" value="succeeded">Money arrives</button> <button class="second" name="outcome" value="failed">Debit fails</button></form>` : "";
    return `<tr><td>${paying}</td><td>${escape(s.payment_status)}${settle}</td><td class="n">${amountText(s.amount_total ?? 0, s.currency ?? "usd")}</td><td>${escape(s.client_reference_id ?? "")}</td><td>${when(s.created)}</td></tr>`;
  });
  const lines = state.balance.toReversed().map((b) => `<tr><td>${escape(b.type)}</td><td>${escape(b.description ?? "")}</td><td class="n">${amountText(b.amount, b.currency)}</td><td class="n">${amountText(b.fee, b.currency)}</td><td class="n">${amountText(b.net, b.currency)}</td><td>${state.paidOut[b.id] === undefined ? "on the balance" : "paid out"}</td></tr>`);
  const payouts = state.payouts.toReversed().map((p) => `<tr><td class="n">${amountText(p.amount, p.currency)}</td><td>${escape(p.status)}</td><td>${new Date(p.arrival_date * 1000).toISOString().slice(0, 10)}</td><td><code>${p.id}</code></td></tr>`);
  const deliveries = state.deliveries.slice(-30).toReversed().map((d) => `<tr><td>${escape(d.type)}</td><td>${d.outcome === "unreachable" ? "application not reached" : escape(String(d.outcome))}</td><td>${escape(d.at.slice(0, 19).replace("T", " "))}</td></tr>`);
  const pay = currencies.map((c) => `<form method="post" action="/payout" style="display:inline-block;margin-right:12px"><input type="hidden" name="currency" value="${c}"><button>Pay out ${c.toUpperCase()}</button></form>`).join("");
  return frame("Local test payment provider", `<h1>Payments</h1><p><a href="/">Look again</a></p>
<h2>Payment pages</h2>${table("Payment pages", ["Page", "Paid", "Amount", "For", "Made"], sessions)}
<h2>Balance</h2>${pay}${table("Balance", ["What", "Text", "Gross", "Fee", "Net", "Where"], lines)}
<h2>Payouts</h2>${table("Payouts", ["Amount", "State", "Arrives", "Number"], payouts)}
<h2>Events told to the application</h2>${table("Events", ["Event", "Answer", "At (real time)"], deliveries)}`);
}
