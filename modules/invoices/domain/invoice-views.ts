/** Saved views of the invoice list. */
export const INVOICE_VIEWS = ["open", "overdue", "paid", "draft", "all"] as const;
export type InvoiceView = (typeof INVOICE_VIEWS)[number];
