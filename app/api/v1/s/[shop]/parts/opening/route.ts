import { handle } from "@/modules/access/api";
import { openStockEndpoint } from "@/modules/stock/write-endpoints";

export const POST = handle(openStockEndpoint);
