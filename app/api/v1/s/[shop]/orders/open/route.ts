import { handle } from "@/modules/access/api";
import { openOrderEndpoint } from "@/modules/work-orders/write-endpoints";

export const POST = handle(openOrderEndpoint);
