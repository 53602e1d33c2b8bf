import { handle } from "@/modules/access/api";
import { findPartsEndpoint } from "@/modules/stock/endpoints";

export const GET = handle(findPartsEndpoint);
