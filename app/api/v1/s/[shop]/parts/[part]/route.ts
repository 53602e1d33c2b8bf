import { handle } from "@/modules/access/api";
import { partEndpoint } from "@/modules/stock/endpoints";

export const GET = handle(partEndpoint);
