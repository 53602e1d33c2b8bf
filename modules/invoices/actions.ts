"use server";
import { shopAction } from "@/modules/access/action";
import { applyCredit, creditInvoice, writeOffInvoice } from "./credit";
import { draftInvoice, dropDraft, saveDraft } from "./draft";
import { issueInvoice } from "./issue";
import { sendInvoice } from "./paper";

export const draftInvoiceAction = shopAction(draftInvoice);
export const saveDraftAction = shopAction(saveDraft);
export const dropDraftAction = shopAction(dropDraft);
export const issueInvoiceAction = shopAction(issueInvoice);
export const sendInvoiceAction = shopAction(sendInvoice);
export const creditInvoiceAction = shopAction(creditInvoice);
export const applyCreditAction = shopAction(applyCredit);
export const writeOffInvoiceAction = shopAction(writeOffInvoice);
