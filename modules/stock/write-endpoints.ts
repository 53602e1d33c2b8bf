import "server-only";
import { commandEndpoint } from "@/modules/access/api";
import { openStock } from "./commands/adjust";
import { countStock } from "./commands/count";
import { addPart } from "./commands/parts";

export const addPartEndpoint = commandEndpoint(addPart, { path: "/api/v1/s/{shop}/parts/add", summary: "A new part" });
export const openStockEndpoint = commandEndpoint(openStock, { path: "/api/v1/s/{shop}/parts/opening", summary: "Stock a shop begins with, at its value" });
export const countStockEndpoint = commandEndpoint(countStock, { path: "/api/v1/s/{shop}/parts/count", summary: "A count of the shelf" });
