import type Stripe from "stripe";
import { page, redirect, type Answer, type Call } from "../shared/http";
import { digitsOf, expiryOf, mistakesIn, outcomeOf, type Typed } from "./cards";
import type { CardUsed } from "./objects";
import { checkoutPage, overPage, secondStepPage } from "./pages";
import type { Provider } from "./provider";

const FIELDS = ["email", "number", "expiry", "cvc", "name"] as const;

const successUrl = (session: Stripe.Checkout.Session): string => (session.success_url ?? "/").replaceAll("{CHECKOUT_SESSION_ID}", session.id);

function used(typed: Typed, secondStep: boolean): CardUsed {
  const expiry = expiryOf(typed.expiry) ?? { month: 12, year: 2034 };
  return { last4: digitsOf(typed.number).slice(-4), expMonth: expiry.month, expYear: expiry.year, name: typed.name.trim() || null, email: typed.email.trim() || null, secondStep };
}

function submitted(provider: Provider, session: Stripe.Checkout.Session, form: URLSearchParams, now: Date): Answer {
  const typed = Object.fromEntries(FIELDS.map((name) => [name, form.get(name) ?? ""])) as unknown as Typed;
  const description = provider.intentOf(session).description;
  const again = (whole: string | undefined, fields = {}) => page(checkoutPage(session, description, typed, { fields, ...(whole === undefined ? {} : { whole }) }), 422);
  const done = () => redirect(successUrl(session));

  if (form.get("way") === "debit") {
    const { email } = mistakesIn(typed, now);
    if (email !== undefined) return again(undefined, { email });
    provider.payLater(session, typed.name.trim() || null, typed.email.trim());
    return done();
  }
  const fields = mistakesIn(typed, now);
  if (Object.keys(fields).length > 0) return again(undefined, fields);
  const outcome = outcomeOf(typed.number);
  if (outcome?.kind === "declined") {
    provider.decline(session, used(typed, false), outcome.code, outcome.message);
    return again(outcome.message, { number: outcome.message });
  }
  if (outcome?.kind === "second-step") {
    const step = form.get("step");
    if (step === null) return page(secondStepPage(session, description, typed));
    if (step !== "confirm") {
      const message = "The bank did not confirm that it is you. Try again or use another card.";
      provider.decline(session, used(typed, false), "authentication_required", message);
      return again(message);
    }
  }
  provider.pay(session, used(typed, outcome?.kind === "second-step"));
  return done();
}

/** The hosted payment page of a session: shown, sent, and over. */
export function answerCheckout(provider: Provider, sessionId: string, call: Call, now: Date): Answer {
  const session = provider.session(sessionId);
  const description = provider.intentOf(session).description;
  if (session.status !== "open") return page(overPage(session, description, successUrl(session)));
  if (call.method === "POST") return submitted(provider, session, new URLSearchParams(call.body.toString("utf8")), now);
  const blank: Typed = { email: session.customer_email ?? "", number: "", expiry: "", cvc: "", name: "" };
  return page(checkoutPage(session, description, blank, { fields: {} }));
}
