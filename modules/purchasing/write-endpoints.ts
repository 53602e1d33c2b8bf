import "server-only";
import { commandEndpoint } from "@/modules/access/api";
import { draftPurchaseOrder, sendPurchaseOrder } from "./commands/orders";
import { receiveGoods } from "./commands/receive";
import { addSupplier } from "./commands/suppliers";

export const addSupplierEndpoint = commandEndpoint(addSupplier, { path: "/api/v1/s/{shop}/suppliers/add", summary: "A new supplier" });
export const draftPurchaseEndpoint = commandEndpoint(draftPurchaseOrder, { path: "/api/v1/s/{shop}/purchases/draft", summary: "A purchase order that nobody was sent yet" });
export const sendPurchaseEndpoint = commandEndpoint(sendPurchaseOrder, { path: "/api/v1/s/{shop}/purchases/send", summary: "Sends a purchase order, or marks it as ordered by hand" });
export const receiveGoodsEndpoint = commandEndpoint(receiveGoods, { path: "/api/v1/s/{shop}/purchases/receive", summary: "A delivery, whole or in part, with its freight" });
