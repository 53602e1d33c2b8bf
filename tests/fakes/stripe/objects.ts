import type Stripe from "stripe";
import { newId } from "./state";

/** New objects with every field that the provider's own types promise. Amounts are minor units, times Unix seconds. */
export interface SessionFacts {
  id: string;
  amount: number;
  currency: string;
  reference: string | null;
  metadata: Record<string, string>;
  email: string | null;
  successUrl: string;
  cancelUrl: string | null;
  expiresAt: number;
  created: number;
  url: string;
}

export const newSession = (f: SessionFacts): Stripe.Checkout.Session => ({
  id: f.id, object: "checkout.session", adaptive_pricing: { enabled: false }, after_expiration: null, allow_promotion_codes: null,
  allowed_payment_method_types: null, amount_subtotal: f.amount, amount_total: f.amount,
  automatic_tax: { enabled: false, liability: null, provider: null, status: null }, billing_address_collection: null, cancel_url: f.cancelUrl,
  client_reference_id: f.reference, client_secret: null, collected_information: null, consent: null, consent_collection: null, created: f.created,
  currency: f.currency, currency_conversion: null, custom_fields: [],
  custom_text: { after_submit: null, shipping_address: null, submit: null, terms_of_service_acceptance: null },
  customer: null, customer_account: null, customer_creation: "if_required", customer_details: null, customer_email: f.email, discounts: [],
  expires_at: f.expiresAt, integration_identifier: null, invoice: null,
  invoice_creation: { enabled: false, invoice_data: { account_tax_ids: null, custom_fields: null, description: null, footer: null, issuer: null, metadata: {}, rendering_options: null } },
  livemode: false, locale: null, managed_payments: null, metadata: f.metadata, mode: "payment", origin_context: null, payment_intent: null, payment_link: null,
  payment_method_collection: "if_required", payment_method_configuration_details: null, payment_method_options: {}, payment_method_types: ["card", "us_bank_account"],
  payment_status: "unpaid", permissions: null, recovered_from: null, saved_payment_method_options: null, setup_intent: null,
  shipping_address_collection: null, shipping_cost: null, shipping_options: [], status: "open", submit_type: null, subscription: null,
  success_url: f.successUrl, total_details: { amount_discount: 0, amount_shipping: 0, amount_tax: 0 }, ui_mode: "hosted_page", url: f.url, wallet_options: null,
});

export interface IntentFacts {
  amount: number;
  currency: string;
  description: string | null;
  metadata: Record<string, string>;
  created: number;
}

export function newIntent(f: IntentFacts): Stripe.PaymentIntent {
  const id = newId("pi");
  return {
    id, object: "payment_intent", allowed_payment_method_types: null, amount: f.amount, amount_capturable: 0, amount_received: 0, application: null,
    application_fee_amount: null, automatic_payment_methods: null, canceled_at: null, cancellation_reason: null, capture_method: "automatic_async",
    client_secret: `${id}_secret_${newId("s", 20).slice(2)}`, confirmation_method: "automatic", created: f.created, currency: f.currency, customer: null,
    customer_account: null, description: f.description, excluded_payment_method_types: null, last_payment_error: null, latest_charge: null, livemode: false,
    managed_payments: null, metadata: f.metadata, next_action: null, on_behalf_of: null, payment_method: null, payment_method_configuration_details: null,
    payment_method_options: {}, payment_method_types: ["card"], payment_record: null, processing: null, receipt_email: null, review: null, setup_future_usage: null,
    shipping: null, source: null, statement_descriptor: null, statement_descriptor_suffix: null, status: "requires_payment_method", transfer_data: null, transfer_group: null,
  };
}

export interface CardUsed {
  last4: string;
  expMonth: number;
  expYear: number;
  name: string | null;
  email: string | null;
  secondStep: boolean;
}

const cardDetails = (card: CardUsed, amount: number): Stripe.Charge.PaymentMethodDetails.Card => ({
  amount_authorized: amount, authorization_code: "123456", brand: "visa", checks: { address_line1_check: null, address_postal_code_check: null, cvc_check: "pass" },
  country: "US", electronic_commerce_indicator: card.secondStep ? "05" : null, exp_month: card.expMonth, exp_year: card.expYear, fingerprint: "local", funding: "credit",
  installments: null, last4: card.last4, mandate: null, network: "visa", network_transaction_id: null, regulated_status: "unregulated",
  three_d_secure: card.secondStep
    ? { authentication_flow: "challenge", electronic_commerce_indicator: "05", exemption_indicator: null, result: "authenticated", result_reason: null, transaction_id: newId("tds"), version: "2.2.0" }
    : null,
  transaction_link_id: null, wallet: null,
});

export interface ChargeFacts {
  intent: Stripe.PaymentIntent;
  card: CardUsed | null;
  created: number;
  failure: { code: string; message: string } | null;
}

export const newCharge = (f: ChargeFacts): Stripe.Charge => ({
  id: newId("ch"), object: "charge", amount: f.intent.amount, amount_captured: f.failure === null ? f.intent.amount : 0, amount_refunded: 0, application: null,
  application_fee: null, application_fee_amount: null, balance_transaction: null,
  billing_details: { address: null, email: f.card?.email ?? null, name: f.card?.name ?? null, phone: null, tax_id: null }, calculated_statement_descriptor: "LOCAL TEST",
  captured: f.failure === null, created: f.created, currency: f.intent.currency, customer: null, description: f.intent.description, disputed: false,
  failure_balance_transaction: null, failure_code: f.failure?.code ?? null, failure_message: f.failure?.message ?? null, fraud_details: {}, livemode: false,
  metadata: f.intent.metadata, on_behalf_of: null,
  outcome: {
    advice_code: null, network_advice_code: null, network_decline_code: null, network_status: f.failure === null ? "approved_by_network" : "declined_by_network",
    reason: f.failure?.code ?? null, risk_level: "normal", seller_message: f.failure === null ? "Payment complete." : "The bank declined the payment.",
    type: f.failure === null ? "authorized" : "issuer_declined",
  },
  paid: f.failure === null, payment_intent: f.intent.id, payment_method: newId("pm"),
  payment_method_details: f.card === null ? { type: "us_bank_account" } : { type: "card", card: cardDetails(f.card, f.intent.amount) },
  receipt_email: null, receipt_number: null, receipt_url: null, refunded: false, review: null, shipping: null, source: null, source_transfer: null,
  statement_descriptor: null, statement_descriptor_suffix: null, status: f.failure === null ? "succeeded" : "failed", transfer_data: null, transfer_group: null,
});

export const newRefund = (charge: Stripe.Charge, amount: number, metadata: Record<string, string>, created: number): Stripe.Refund => ({
  id: newId("re"), object: "refund", amount, balance_transaction: null, charge: charge.id, created, currency: charge.currency, customer: null, customer_account: null,
  destination_details: { type: "card", card: { reference: "local", reference_status: "available", reference_type: "acquirer_reference_number", type: "refund" } },
  metadata, payment_intent: charge.payment_intent, payment_method: charge.payment_method, reason: null, receipt_number: null, source_transfer_reversal: null, status: "succeeded", transfer_reversal: null,
});

export interface BalanceFacts {
  type: "charge" | "payment" | "refund" | "adjustment" | "payout";
  amount: number;
  fee: number;
  feeWhat: string;
  currency: string;
  source: string;
  description: string | null;
  created: number;
}

export const newBalance = (f: BalanceFacts): Stripe.BalanceTransaction => ({
  id: newId("txn"), object: "balance_transaction", amount: f.amount, available_on: f.created, balance_type: "payments", created: f.created, currency: f.currency,
  description: f.description, exchange_rate: null, fee: f.fee,
  fee_details: f.fee === 0 ? [] : [{ amount: f.fee, application: null, currency: f.currency, description: f.feeWhat, type: "stripe_fee" }],
  net: f.amount - f.fee, reporting_category: f.type === "adjustment" ? "dispute" : f.type, source: f.source, status: "available", type: f.type,
});

export const newPayout = (amount: number, currency: string, arrival: number, created: number): Stripe.Payout => ({
  id: newId("po"), object: "payout", amount, application_fee: null, application_fee_amount: null, arrival_date: arrival, automatic: true, balance_transaction: null,
  created, currency, description: "LOCAL TEST PAYOUT", destination: null, failure_balance_transaction: null, failure_code: null, failure_message: null, livemode: false,
  metadata: {}, method: "standard", original_payout: null, payout_method: null, reconciliation_status: "completed", reversed_by: null, source_type: "card",
  statement_descriptor: null, status: "paid", trace_id: { status: "supported", value: newId("trace", 12).toUpperCase() }, type: "bank_account",
});

const noEvidence: Stripe.Dispute.Evidence = {
  access_activity_log: null, billing_address: null, cancellation_policy: null, cancellation_policy_disclosure: null, cancellation_rebuttal: null,
  customer_communication: null, customer_email_address: null, customer_name: null, customer_purchase_ip: null, customer_signature: null,
  duplicate_charge_documentation: null, duplicate_charge_explanation: null, duplicate_charge_id: null, enhanced_evidence: {}, product_description: null, receipt: null,
  refund_policy: null, refund_policy_disclosure: null, refund_refusal_explanation: null, service_date: null, service_documentation: null, shipping_address: null,
  shipping_carrier: null, shipping_date: null, shipping_documentation: null, shipping_tracking_number: null, uncategorized_file: null, uncategorized_text: null,
};

export const newDispute = (charge: Stripe.Charge, created: number): Stripe.Dispute => ({
  id: newId("du"), object: "dispute", amount: charge.amount, balance_transactions: [], charge: charge.id, created, currency: charge.currency, enhanced_eligibility_types: [],
  evidence: noEvidence,
  evidence_details: { due_by: created + 7 * 86_400, enhanced_eligibility: {}, has_evidence: false, past_due: false, submission_count: 0, submission_method: "not_submitted" },
  intended_submission_method: null, is_charge_refundable: false, livemode: false, metadata: {}, payment_intent: charge.payment_intent, reason: "general", status: "needs_response",
});
