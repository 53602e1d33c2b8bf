import { handle } from "@/modules/access/api";
import { countStockEndpoint } from "@/modules/stock/write-endpoints";

export const POST = handle(countStockEndpoint);
