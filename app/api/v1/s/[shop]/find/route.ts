import { handle } from "@/modules/access/api";
import { findEndpoint } from "@/modules/work-orders/endpoints";

export const GET = handle(findEndpoint);
