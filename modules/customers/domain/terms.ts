/** Ways a customer may pay later. The day counts from the invoice's date. */
export const TERMS = ["receipt", "net_15", "net_30", "end_of_month"] as const;
export type Terms = (typeof TERMS)[number];

export const TERMS_WORDS: Record<Terms, string> = {
  receipt: "Due on receipt", net_15: "Net 15 days", net_30: "Net 30 days", end_of_month: "End of month",
};
