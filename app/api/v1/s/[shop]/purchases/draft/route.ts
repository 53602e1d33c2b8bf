import { handle } from "@/modules/access/api";
import { draftPurchaseEndpoint } from "@/modules/purchasing/write-endpoints";

export const POST = handle(draftPurchaseEndpoint);
