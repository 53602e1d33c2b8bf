import { handle } from "@/modules/access/api";
import { findPurchaseOrdersEndpoint } from "@/modules/purchasing/endpoints";

export const GET = handle(findPurchaseOrdersEndpoint);
