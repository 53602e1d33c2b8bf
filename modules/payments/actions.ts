"use server";
import { secretAction, shopAction } from "@/modules/access/action";
import { linkContext } from "@/modules/access/link";
import { askInvoicePaymentNow, startPaymentNow } from "./ask-payment";
import { takeInBankFile } from "./bank-import";
import { lockMatch, unlockMatch } from "./bank-match";
import { answerRefund, askRefund, closeEvent, explainPayoutItem, retryEvent, takePayment } from "./commands";

export const takePaymentAction = shopAction(takePayment);
export const askInvoicePaymentAction = shopAction(askInvoicePaymentNow);
export const askRefundAction = shopAction(askRefund);
export const answerRefundAction = shopAction(answerRefund);
export const retryEventAction = shopAction(retryEvent);
export const closeEventAction = shopAction(closeEvent);
export const explainPayoutItemAction = shopAction(explainPayoutItem);
export const startPaymentAction = secretAction(startPaymentNow, linkContext);
export const takeInBankFileAction = shopAction(takeInBankFile);
export const lockMatchAction = shopAction(lockMatch);
export const unlockMatchAction = shopAction(unlockMatch);
