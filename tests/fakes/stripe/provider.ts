import type Stripe from "stripe";
import { newBalance, newCharge, newDispute, newIntent, newPayout, newRefund, newSession, type CardUsed } from "./objects";
import { invalid, noSuch } from "./refusal";
import { checkSession, DAY_SECONDS, type SessionWanted } from "./session-rules";
import { feeOf, newId, type Keeper } from "./state";

interface Origin {
  idempotencyKey: string | null;
}

const idOf = (value: string | { id: string } | null): string | null => (value === null || typeof value === "string" ? value : value.id);

/** What happens at the provider: sessions, payments, refunds, disputes and payouts, each told as an event. */
export class Provider {
  constructor(
    private readonly keeper: Keeper,
    private readonly now: () => Date,
    private readonly publicUrl: string,
    private readonly apiVersion: string,
    private readonly told: (event: Stripe.EventBase) => void,
  ) {}

  get state() {
    return this.keeper.state;
  }

  seconds(): number {
    return Math.floor(this.now().getTime() / 1000);
  }

  private tell(type: Stripe.EventBase["type"], object: object, origin?: Origin): void {
    const event: Stripe.EventBase = {
      id: newId("evt"), object: "event", api_version: this.apiVersion, created: this.seconds(),
      // What an event shows is how things stood then.
      data: { object: structuredClone(object) }, livemode: false, pending_webhooks: 1,
      request: origin === undefined ? null : { id: newId("req", 14), idempotency_key: origin.idempotencyKey }, type,
    };
    this.state.events.push(event);
    this.told(event);
  }

  // ── sessions ───────────────────────────────────────────────────────────────

  createSession(w: SessionWanted): Stripe.Checkout.Session {
    const created = this.seconds();
    const expiresAt = w.expiresAt ?? created + DAY_SECONDS;
    checkSession(w.amount, expiresAt, created);
    const id = newId("cs_test", 40);
    const session = newSession({
      id, amount: w.amount, currency: w.currency, reference: w.reference, metadata: w.metadata, email: w.email, successUrl: w.successUrl, cancelUrl: w.cancelUrl,
      expiresAt, created, url: `${this.publicUrl}/c/pay/${id}`,
    });
    // The intent exists from the start, so that what it is for survives a restart.
    const intent = newIntent({ amount: w.amount, currency: w.currency, description: w.description, metadata: w.intentMetadata, created });
    this.state.sessions.push(session);
    this.state.intents.push(intent);
    this.state.intentOfSession[session.id] = intent.id;
    this.keeper.save();
    return session;
  }

  session(id: string): Stripe.Checkout.Session {
    this.expireOverdue();
    const session = this.state.sessions.find((s) => s.id === id);
    if (session === undefined) throw noSuch("checkout.session", id);
    return session;
  }

  intent(id: string): Stripe.PaymentIntent {
    const intent = this.state.intents.find((i) => i.id === id);
    if (intent === undefined) throw noSuch("payment_intent", id);
    return intent;
  }

  intentOf(session: Stripe.Checkout.Session): Stripe.PaymentIntent {
    return this.intent(this.state.intentOfSession[session.id] ?? "");
  }

  /** A session shows its intent from the first attempt to pay. */
  private attempt(session: Stripe.Checkout.Session): Stripe.PaymentIntent {
    const intent = this.intentOf(session);
    session.payment_intent = intent.id;
    return intent;
  }

  expireSession(id: string): Stripe.Checkout.Session {
    const session = this.session(id);
    if (session.status !== "open") throw invalid(`Only Checkout Sessions with a status in ["open"] can be expired. This Checkout Session has a status of \`${session.status ?? ""}\`.`);
    this.close(session);
    this.keeper.save();
    return session;
  }

  private close(session: Stripe.Checkout.Session): void {
    session.status = "expired";
    session.url = null;
    const intent = this.intentOf(session);
    intent.status = "canceled";
    intent.canceled_at = this.seconds();
    this.tell("checkout.session.expired", session);
  }

  /** Sessions whose time is over. Looked at whenever one is asked for, and from time to time. */
  expireOverdue(): void {
    const overdue = this.state.sessions.filter((s) => s.status === "open" && s.expires_at <= this.seconds());
    for (const session of overdue) this.close(session);
    if (overdue.length > 0) this.keeper.save();
  }

  // ── paying ─────────────────────────────────────────────────────────────────

  /** A declined card: the session stays open. */
  decline(session: Stripe.Checkout.Session, card: CardUsed, code: string, message: string): void {
    const intent = this.attempt(session);
    const charge = newCharge({ intent, card, created: this.seconds(), failure: { code, message } });
    this.state.charges.push(charge);
    intent.latest_charge = charge.id;
    intent.last_payment_error = { type: "card_error", code: "card_declined", decline_code: code, message, charge: charge.id };
    this.tell("charge.failed", charge);
    this.tell("payment_intent.payment_failed", intent);
    this.keeper.save();
  }

  private succeed(intent: Stripe.PaymentIntent, card: CardUsed | null): Stripe.Charge {
    const { fee } = this.state;
    const charge = newCharge({ intent, card, created: this.seconds(), failure: null });
    const line = newBalance({
      type: card === null ? "payment" : "charge", amount: charge.amount, fee: feeOf(charge.amount, fee), feeWhat: "Processing fee", currency: charge.currency,
      source: charge.id, description: charge.description, created: charge.created,
    });
    charge.balance_transaction = line.id;
    intent.status = "succeeded";
    intent.amount_received = intent.amount;
    intent.latest_charge = charge.id;
    intent.payment_method = charge.payment_method;
    intent.last_payment_error = null;
    this.state.charges.push(charge);
    this.state.balance.push(line);
    this.tell("charge.succeeded", charge);
    this.tell("payment_intent.succeeded", intent);
    return charge;
  }

  private complete(session: Stripe.Checkout.Session, paid: boolean, name: string | null, email: string | null): void {
    session.status = "complete";
    session.payment_status = paid ? "paid" : "unpaid";
    session.url = null;
    session.customer_details = { address: null, business_name: null, email, individual_name: name, name, phone: null, tax_exempt: "none", tax_ids: [] };
  }

  /** Card accepted: paid at once. Paying a session that is not open changes nothing. */
  pay(session: Stripe.Checkout.Session, card: CardUsed): void {
    if (session.status !== "open") return;
    this.succeed(this.attempt(session), card);
    this.complete(session, true, card.name, card.email);
    this.tell("checkout.session.completed", session);
    this.keeper.save();
  }

  /** A bank debit: the customer is done, the money comes days later, or not. */
  payLater(session: Stripe.Checkout.Session, name: string | null, email: string | null): void {
    if (session.status !== "open") return;
    this.attempt(session).status = "processing";
    this.complete(session, false, name, email);
    this.tell("checkout.session.completed", session);
    this.keeper.save();
  }

  settle(sessionId: string, succeeded: boolean): Stripe.Checkout.Session {
    const session = this.session(sessionId);
    const intent = this.intentOf(session);
    if (session.status !== "complete" || intent.status !== "processing") throw invalid("This session does not wait for a bank debit.");
    if (succeeded) {
      this.succeed(intent, null);
      session.payment_status = "paid";
      this.tell("checkout.session.async_payment_succeeded", session);
    } else {
      intent.status = "requires_payment_method";
      this.tell("payment_intent.payment_failed", intent);
      this.tell("checkout.session.async_payment_failed", session);
    }
    this.keeper.save();
    return session;
  }

  /** A sale that did not come through the application, such as one at a card terminal. */
  sale(amount: number, currency: string, description: string): Stripe.Charge {
    const intent = newIntent({ amount, currency, description, metadata: {}, created: this.seconds() });
    this.state.intents.push(intent);
    const charge = this.succeed(intent, { last4: "4242", expMonth: 12, expYear: 2034, name: null, email: null, secondStep: false });
    this.keeper.save();
    return charge;
  }

  // ── money back ─────────────────────────────────────────────────────────────

  private chargeOf(reference: { charge: string | null; paymentIntent: string | null }): Stripe.Charge {
    const id = reference.charge ?? idOf(this.intent(reference.paymentIntent ?? "").latest_charge);
    const charge = this.state.charges.find((c) => c.id === id);
    if (charge === undefined) {
      if (reference.charge !== null) throw noSuch("charge", reference.charge);
      throw invalid("This PaymentIntent does not have a successful charge to refund.", "payment_intent");
    }
    return charge;
  }

  refund(reference: { charge: string | null; paymentIntent: string | null }, amount: number | null, metadata: Record<string, string>, origin: Origin): Stripe.Refund {
    const charge = this.chargeOf(reference);
    if (charge.status !== "succeeded") throw invalid("This PaymentIntent does not have a successful charge to refund.", "payment_intent");
    if (charge.disputed) throw invalid(`Charge ${charge.id} has been charged back; cannot issue a refund.`, undefined, "charge_disputed");
    const left = charge.amount - charge.amount_refunded;
    if (left === 0) throw invalid(`Charge ${charge.id} has already been refunded.`, undefined, "charge_already_refunded");
    const wanted = amount ?? left;
    if (wanted <= 0) throw invalid("Invalid positive integer", "amount", "parameter_invalid_integer");
    if (wanted > left) throw invalid(`Refund amount (${wanted}) is greater than unrefunded amount on charge (${left})`, "amount", "amount_too_large");
    const created = this.seconds();
    const refund = newRefund(charge, wanted, metadata, created);
    // The fee of the charge is not given back.
    const line = newBalance({ type: "refund", amount: -wanted, fee: 0, feeWhat: "", currency: charge.currency, source: refund.id, description: "REFUND FOR CHARGE", created });
    refund.balance_transaction = line.id;
    charge.amount_refunded += wanted;
    charge.refunded = charge.amount_refunded === charge.amount;
    this.state.refunds.push(refund);
    this.state.balance.push(line);
    this.tell("refund.created", refund, origin);
    this.tell("charge.refunded", charge, origin);
    this.keeper.save();
    return refund;
  }

  /** The customer's bank takes the money back, with a fee. */
  dispute(chargeId: string, feeMinor: number): Stripe.Dispute {
    const charge = this.chargeOf({ charge: chargeId, paymentIntent: null });
    if (charge.disputed) throw invalid(`Charge ${charge.id} is disputed already.`);
    const dispute = newDispute(charge, this.seconds());
    const line = newBalance({
      type: "adjustment", amount: -charge.amount, fee: feeMinor, feeWhat: "Dispute fee", currency: charge.currency, source: dispute.id,
      description: `Chargeback withdrawal for ${charge.id}`, created: dispute.created,
    });
    dispute.balance_transactions = [line];
    charge.disputed = true;
    this.state.disputes.push(dispute);
    this.state.balance.push(line);
    this.tell("charge.dispute.created", dispute);
    this.keeper.save();
    return dispute;
  }

  closeDispute(id: string, won: boolean): Stripe.Dispute {
    const dispute = this.state.disputes.find((d) => d.id === id);
    if (dispute === undefined) throw noSuch("dispute", id);
    if (dispute.status !== "needs_response") throw invalid(`Dispute ${id} is closed already.`);
    dispute.status = won ? "won" : "lost";
    if (won) {
      const line = newBalance({
        type: "adjustment", amount: dispute.amount, fee: 0, feeWhat: "", currency: dispute.currency, source: dispute.id,
        description: `Chargeback reversal for ${idOf(dispute.charge) ?? ""}`, created: this.seconds(),
      });
      dispute.balance_transactions = [...dispute.balance_transactions, line];
      this.state.balance.push(line);
    }
    this.tell("charge.dispute.closed", dispute);
    this.keeper.save();
    return dispute;
  }

  // ── payouts ────────────────────────────────────────────────────────────────

  /** Everything on the balance of a currency goes to the bank, to arrive on a day (UTC midnight). */
  payout(currency: string, arrivalDate: string | null): Stripe.Payout {
    const lines = this.state.balance.filter((b) => b.currency === currency && b.type !== "payout" && this.state.paidOut[b.id] === undefined);
    const amount = lines.reduce((sum, b) => sum + b.net, 0);
    if (lines.length === 0 || amount <= 0) throw invalid(`There is nothing to pay out in ${currency}: the balance is ${amount}.`, undefined, "balance_insufficient");
    const created = this.seconds();
    const arrival = arrivalDate === null ? (Math.floor(created / 86_400) + 2) * 86_400 : Date.parse(`${arrivalDate}T00:00:00Z`) / 1000;
    if (!Number.isInteger(arrival)) throw invalid("arrivalDate must be a day, YYYY-MM-DD.", "arrivalDate");
    const payout = newPayout(amount, currency, arrival, created);
    const own = newBalance({ type: "payout", amount: -amount, fee: 0, feeWhat: "", currency, source: payout.id, description: payout.description, created });
    payout.balance_transaction = own.id;
    this.state.payouts.push(payout);
    this.state.balance.push(own);
    for (const line of [...lines, own]) this.state.paidOut[line.id] = payout.id;
    this.tell("payout.created", payout);
    this.tell("payout.paid", payout);
    this.keeper.save();
    return payout;
  }

  /** Keep an answer for its idempotency key. */
  remember(key: string, answer: { asked: string; status: number; body: string }): void {
    this.state.answers[key] = answer;
    this.keeper.save();
  }

  /** Any object by its id, for `expand`. */
  find(id: string): object | undefined {
    const { sessions, intents, charges, refunds, disputes, payouts, balance } = this.state;
    return [...sessions, ...intents, ...charges, ...refunds, ...disputes, ...payouts, ...balance].find((o) => o.id === id);
  }
}
