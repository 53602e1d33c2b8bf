import { handle } from "@/modules/access/api";
import { findOrdersEndpoint } from "@/modules/work-orders/endpoints";

export const GET = handle(findOrdersEndpoint);
