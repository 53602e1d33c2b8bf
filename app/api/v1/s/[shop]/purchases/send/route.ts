import { handle } from "@/modules/access/api";
import { sendPurchaseEndpoint } from "@/modules/purchasing/write-endpoints";

export const POST = handle(sendPurchaseEndpoint);
