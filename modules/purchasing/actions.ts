"use server";
import { shopAction } from "@/modules/access/action";
import { cancelPurchaseOrder, changePurchaseOrder, draftPurchaseOrder, expectPurchaseOrder, sendPurchaseOrder } from "./commands/orders";
import { receiveGoods } from "./commands/receive";
import { reverseReceipt } from "./commands/reverse-receipt";
import { addSupplier, changeSupplier } from "./commands/suppliers";

export const addSupplierAction = shopAction(addSupplier);
export const changeSupplierAction = shopAction(changeSupplier);
export const draftPurchaseOrderAction = shopAction(draftPurchaseOrder);
export const changePurchaseOrderAction = shopAction(changePurchaseOrder);
export const sendPurchaseOrderAction = shopAction(sendPurchaseOrder);
export const expectPurchaseOrderAction = shopAction(expectPurchaseOrder);
export const cancelPurchaseOrderAction = shopAction(cancelPurchaseOrder);
export const receiveGoodsAction = shopAction(receiveGoods);
export const reverseReceiptAction = shopAction(reverseReceipt);
